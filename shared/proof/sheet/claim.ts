import { groupBy } from '../../kernel/groupBy';
import { standingSettling, type Deviation } from '../../walk/deviation';
import type { Choice, Source } from '../../walk/events';
import { stageOf } from '../../walk/slots';
import type { WalkState } from '../../walk/state';
import { phrase, type Phrase, type PhraseParam } from '../phrase';
import type { ProofColumn, ProofCounts, ProofLine, ProofRow } from '../sheet';
import { finalCells } from './counts';
import { toldDeviations } from './deviations';
import { nounOf, placeOf } from './source';

/** More than these are counted in the paragraph and told in the table below it, on the same page. */
const MOST_SENTENCES = 4;

const sourcesOf = (columns: ProofColumn[], rows: ProofRow[], kind: ProofColumn['kind']): Source[] => [
  ...new Set(
    finalCells(columns, rows)
      .filter(({ column }) => column.kind === kind)
      .flatMap(({ cell }) => cell.sources),
  ),
];

const named = (sources: readonly Source[]): PhraseParam => ({
  list: sources.map((source) => ({ phrase: phrase(`source.${source}`) })),
  join: 'or',
});

/** *readings sent by the wrench*, or *torque typed, turns sent by the wrench* where the kinds differ. */
function sourcesPhrase(columns: ProofColumn[], rows: ProofRow[], counts: ProofCounts): PhraseParam {
  const kinds = (['torque', 'turn', 'check'] as const)
    .map((kind) => ({ kind, sources: sourcesOf(columns, rows, kind) }))
    .filter(({ sources }) => sources.length > 0);
  const [first] = kinds;
  if (!first) return { phrase: phrase(counts.marks.count > 0 ? 'sources.eye' : 'sources.none') };
  const same = kinds.every(({ sources }) => sources.join() === first.sources.join());
  if (same) return { phrase: phrase('sources.all', { source: named(first.sources) }) };
  const list = kinds.map(({ kind, sources }) => ({
    phrase: phrase(`sources.${kind}`, { source: named(sources) }),
  }));
  return { list, join: 'comma' };
}

function recorded(state: WalkState, columns: ProofColumn[], rows: ProofRow[], counts: ProofCounts): Phrase {
  const key = state.opened?.purpose === 'recheck' ? 'claim.rechecked' : 'claim.recorded';
  return phrase(key, {
    done: counts.fasteners.done,
    total: counts.fasteners.total,
    passes: { phrase: phrase('claim.passes', { n: counts.passes }) },
    sources: sourcesPhrase(columns, rows, counts),
  });
}

/** The page that allows this rework, as the pass cites it (R6). */
function citation(state: WalkState, deviation: Deviation): PhraseParam {
  const pass = deviation.slot && stageOf(state, deviation.slot)?.pass;
  if (!pass) return { phrase: phrase('cite.none') };
  const { cite } = pass.rework;
  return { phrase: cite === 'manualSilent' ? phrase('cite.silent') : phrase('cite.page', { page: cite.page }) };
}

function whereOf(state: WalkState, hole: string | null): PhraseParam {
  if (hole === null) return { phrase: phrase('where.joint') };
  const label = placeOf(state, hole, null).label ?? hole;
  return { phrase: phrase(`where.${nounOf(state, hole)}`, { label }) };
}

function sentence(state: WalkState, group: readonly Deviation[]): Phrase | null {
  const [first] = group;
  if (!first) return null;
  const found: PhraseParam = {
    list: group.map(({ kind, note }) => ({ phrase: phrase(`said.${kind}`, { note: note ?? '' }) })),
    join: 'and',
  };
  const where = whereOf(state, first.hole);
  const settling = standingSettling(first);
  if (!settling) return phrase('claim.about', { where, found });
  const cited: ReadonlySet<Choice> = new Set(['restart', 'replace', 'restartJoint']);
  const cite: PhraseParam = cited.has(settling.choice) ? citation(state, first) : '';
  const settled = { phrase: phrase(`did.${settling.choice}`, { person: { person: settling.by }, cite }) };
  return phrase('claim.settled', { where, found, settled });
}

/** One sentence for all that one decision about one fastener answered; those with a decision come first. */
function deviationSentences(state: WalkState): Phrase[] {
  const groups = groupBy(
    toldDeviations(state),
    (deviation) => `${deviation.hole ?? ''} ${standingSettling(deviation)?.seq ?? `noted ${deviation.kind}`}`,
  );
  const sorted = [...groups.values()].sort((a, b) => Number(!a[0]?.settlings.length) - Number(!b[0]?.settlings.length));
  const sentences = sorted.map((group) => sentence(state, group)).filter((said) => said !== null);
  const left = sentences.length - MOST_SENTENCES;
  return left > 0 ? [...sentences.slice(0, MOST_SENTENCES), phrase('claim.more', { n: left })] : sentences;
}

const share = (key: 'claim.finals' | 'claim.clicked' | 'claim.marks', part: ProofCounts['marks']): Phrase[] =>
  part.count === 0 ? [] : [phrase(key, { inside: part.inside, count: part.count })];

/** P2: who decided about their own readings, and whether nobody looked at them a second time. */
function ruleSentences(state: WalkState): Phrase[] {
  const signed = state.signatures.some((sign) => sign.stands && sign.role === 'countersigner');
  const own = state.deviations.some(({ settlings }) =>
    settlings.some(({ choice, by }) => choice === 'accept' && state.everHands.includes(by)),
  );
  const ownCountersign = state.signatures.some(
    (sign) => sign.stands && sign.role === 'countersigner' && state.everHands.includes(sign.by),
  );
  return [
    ...(signed ? [] : [phrase('claim.noCountersignature')]),
    ...(own || ownCountersign ? [phrase('claim.shopOfOne')] : []),
  ];
}

/** One or two are told with both values; more are counted, and told below on the same page. */
function changeSentences(state: WalkState, changes: readonly ProofLine[]): Phrase[] {
  if (changes.length > 2) return [phrase('claim.changed', { n: changes.length })];
  return changes.map(({ place, said }) =>
    phrase('claim.changedOne', { where: whereOf(state, place.hole), said: { phrase: said } }),
  );
}

/** The first paragraph: it claims what is known and leaves no deviation out (D1). */
export function claimOf(
  state: WalkState,
  table: { columns: ProofColumn[]; rows: ProofRow[] },
  counts: ProofCounts,
  changes: readonly ProofLine[],
): Phrase[] {
  const simulated = state.readings.some((record) => record.data.source === 'simulated');
  return [
    ...(simulated ? [phrase('claim.simulated')] : []),
    recorded(state, table.columns, table.rows, counts),
    ...share('claim.finals', counts.measured),
    ...share('claim.clicked', counts.clicked),
    ...share('claim.marks', counts.marks),
    ...ruleSentences(state),
    ...deviationSentences(state),
    ...changeSentences(state, changes),
  ];
}
