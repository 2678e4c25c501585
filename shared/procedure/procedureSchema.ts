import { z } from 'zod';
import { err, ok, type Result } from '../kernel/result';
import type { Unit } from '../quantity/unit';
import type { ProcedureDocument } from './procedure';
import type { ProcedureProblem } from './procedureProblem';
import { procedureProblems } from './procedureProblems';

/** Largest sizes of a document: the biggest joints have a few hundred bolts, and a tablet keeps every revision. */
export const PROCEDURE_LIMITS = { holes: 400, passes: 24, stages: 8, steps: 120, kinds: 40, bores: 60 } as const;

const isStorable = (text: string): boolean => !/\p{Surrogate}/u.test(text) && !text.includes('\u0000');
const words = (most: number) => z.string().trim().min(1).max(most).refine(isStorable);
/** Ids become parts of keys such as `p1/s1/1` and `dry@h5`: neither `/` nor `@` may stand in them. */
const id = z.string().regex(/^[A-Za-z0-9][A-Za-z0-9_-]{0,31}$/);
const decimal = z.string().regex(/^\d{1,9}(\.\d{1,6})?$/);
const millimetres = z.number().min(-20_000).max(20_000);
const unit = z.enum(['N.m', 'lbf.ft', 'lbf.in', 'kgf.m', 'deg', 'mm', 'in'] satisfies Unit[]);
const window = z.strictObject({ target: decimal, low: decimal, high: decimal, unit });
const byGroup = <T extends z.ZodType>(value: T) => z.record(id, value);
const windows = byGroup(window);
const used = z.string().max(70).optional();

const stage = z.discriminatedUnion('kind', [
  z.strictObject({ id, kind: z.literal('torque'), windows, strict: z.boolean().optional() }),
  z.strictObject({
    id,
    kind: z.literal('turn'),
    windows,
    endTorque: z.strictObject({ use: z.enum(['required', 'wanted', 'unused']), windows: windows.optional() }),
    monitor: byGroup(z.strictObject({ low: decimal, high: decimal, unit })).optional(),
  }),
  z.strictObject({ id, kind: z.literal('loosen'), turn: z.enum(['quarter', 'free', 'breakLoose']) }),
  z.strictObject({
    id,
    kind: z.literal('check'),
    check: z.enum(['firstMovement', 'breakLoose', 'markAndReturn', 'witnessMark']),
    windows: windows.optional(),
  }),
  z.strictObject({ id, kind: z.literal('runDown') }),
]);

const minutes = z.number().int().min(1).max(10_080).optional();
const order = z.array(id).min(1).max(PROCEDURE_LIMITS.holes);

const pass = z.strictObject({
  id,
  name: words(80),
  order,
  stages: z.array(stage).min(1).max(PROCEDURE_LIMITS.stages),
  rework: z.strictObject({
    allows: z.enum(['oneFastener', 'joint']),
    cite: z.union([z.strictObject({ page: words(40) }), z.literal('manualSilent')]),
  }),
  repeat: z.strictObject({ mostRounds: z.number().int().min(1).max(20) }).optional(),
  waitMinutes: minutes,
  finishWithinMinutes: minutes,
});

const place = z.union([
  z.strictObject({ at: z.enum(['beforeJoint', 'afterJoint']) }),
  z.strictObject({ at: z.enum(['beforePass', 'afterPass']), pass: id }),
  z.strictObject({ at: z.literal('beforeHole'), groups: z.array(id).min(1).max(PROCEDURE_LIMITS.kinds).optional() }),
]);

const fastener = z.strictObject({
  id,
  name: words(80),
  kind: z.enum(['bolt', 'stud', 'nut', 'capScrew']),
  thread: words(40),
  propertyClass: words(20).optional(),
  hand: z.enum(['right', 'left']),
  reuse: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('singleUse'), usedFrom: used }),
    z.strictObject({ kind: z.literal('limited'), most: z.number().int().min(2).max(99), usedFrom: used }),
    z.strictObject({ kind: z.literal('reusable') }),
  ]),
  lubricant: z
    .strictObject({
      what: words(80),
      where: z
        .array(z.enum(['thread', 'underHead', 'washer']))
        .min(1)
        .max(3),
    })
    .nullable(),
  drive: words(20).optional(),
});

const side = words(40).optional();
const at = { x: millimetres, y: millimetres };

/** The shape of a procedure document alone; `parseProcedure` also checks that it does not contradict itself. */
export const procedureDocument: z.ZodType<ProcedureDocument> = z.strictObject({
  schema: z.literal(1),
  code: z.string().regex(/^[A-Z0-9][A-Z0-9.-]{0,39}$/),
  title: words(120),
  engine: words(80),
  component: words(80),
  source: z.strictObject({ title: words(160), page: words(40), date: z.iso.date() }),
  toleranceIsShops: z.boolean(),
  map: z.strictObject({
    sides: z.strictObject({ top: side, right: side, bottom: side, left: side }),
    bores: z
      .array(z.strictObject({ ...at, r: z.number().positive().max(5_000), label: z.string().max(20) }))
      .max(PROCEDURE_LIMITS.bores),
    outline: z.enum(['rectangle', 'round']).optional(),
  }),
  groups: z
    .array(z.strictObject({ id, name: words(40) }))
    .min(1)
    .max(PROCEDURE_LIMITS.kinds),
  holes: z
    .array(z.strictObject({ id, label: words(8), ...at, group: id, fastener: id }))
    .min(1)
    .max(PROCEDURE_LIMITS.holes),
  fasteners: z.array(fastener).min(1).max(PROCEDURE_LIMITS.kinds),
  parts: z
    .array(
      z.strictObject({ id, name: words(80), count: z.number().int().min(1).max(999), renewedOnRestart: z.boolean() }),
    )
    .max(PROCEDURE_LIMITS.kinds),
  passes: z.array(pass).min(1).max(PROCEDURE_LIMITS.passes),
  steps: z
    .array(
      z.strictObject({
        id,
        place,
        kind: z.enum(['do', 'look', 'measure', 'photograph']),
        text: words(300),
        window: window.optional(),
        paintsStripes: z.boolean().optional(),
        caution: words(40).optional(),
      }),
    )
    .max(PROCEDURE_LIMITS.steps),
  loosening: order.optional(),
});

/**
 * A procedure document that the walk's rules can rely on, or everything wrong with it: first the shape (`badShape` with
 * the member's path), and once that is right every contradiction by its own code.
 */
export function parseProcedure(value: unknown): Result<ProcedureDocument, ProcedureProblem[]> {
  const shaped = procedureDocument.safeParse(value);
  if (!shaped.success) {
    return err(shaped.error.issues.map((issue) => ({ code: 'badShape', path: issue.path.join('.') })));
  }
  const problems = procedureProblems(shaped.data);
  return problems.length > 0 ? err(problems) : ok(shaped.data);
}
