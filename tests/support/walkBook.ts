import { createHash } from 'node:crypto';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { canonicalJson } from '@shared/record/canonicalJson';
import { brindleWrenches } from '../../db/seed/wrenches';
import { openBook, type WalkBook, type WalkSetting } from '../../db/seed/walker/walkBook';

/** Ids of a walk in tests: well-formed, and told apart at a glance. */
export const testIds = {
  shop: '01900000-0000-7000-8000-0000000000a0',
  walk: '01900000-0000-7000-8000-0000000000b0',
  job: '01900000-0000-7000-8000-0000000000c0',
  joint: '01900000-0000-7000-8000-0000000000c1',
  tablet: '01900000-0000-7000-8000-0000000000d0',
  technician: '01900000-0000-7000-8000-0000000000e1',
  colleague: '01900000-0000-7000-8000-0000000000e2',
  supervisor: '01900000-0000-7000-8000-0000000000e3',
} as const;

const wrenchId = (tag: string): string => `01900000-0000-7000-8000-0000000${tag.slice(2).padStart(5, '0')}`;

const START_MS = Date.parse('2026-06-13T11:40:00.000Z');

/** SHA-256 (hex) of a document's canonical JSON, as `walk.opened` names it. */
export const documentHash = (document: ProcedureDocument): string =>
  createHash('sha256').update(canonicalJson(document)).digest('hex');

/** What a walk in tests begins with. */
export const testSetting = (procedure: ProcedureDocument, more: Partial<WalkSetting> = {}): WalkSetting => ({
  job: testIds.job,
  joint: testIds.joint,
  procedure,
  revision: 1,
  hash: documentHash(procedure),
  tablet: testIds.tablet,
  boot: 'boot-1',
  known: 7,
  startMs: START_MS,
  people: {
    [testIds.technician]: ['technician'],
    [testIds.colleague]: ['technician'],
    [testIds.supervisor]: ['supervisor'],
  },
  pulls: testIds.technician,
  records: testIds.technician,
  supervisor: testIds.supervisor,
  wrenches: brindleWrenches(START_MS, wrenchId),
  ...more,
});

/** A book on a procedure, before its first event. */
export const testBook = (procedure: ProcedureDocument, more: Partial<WalkSetting> = {}): WalkBook =>
  openBook(testSetting(procedure, more));
