import { computed, reactive, type ComputedRef } from 'vue';
import { useI18n } from 'vue-i18n';
import type { EntryProblem } from '@shared/quantity/entry';
import type { Verdict } from '@shared/judge/verdict';
import { slotKey, stageOf } from '@shared/walk/slots';
import { nextSlots } from '@shared/walk/route';
import { holeOf, unitOf } from './pullEntry';
import { figureOf } from './readingEntry';
import type { PullEntryUse } from './usePullEntry';
import type { PullFrameUse } from './usePullFrame';
import { useShownUnits } from './useShownUnits';
import { useWalkAccess, type WalkAccess } from './walkAccess';
import { useWalkWords, type WalkWords } from './useWalkWords';

/** The main button: what it will do, in words that are true. */
export interface RecordWords {
  kind: 'waiting' | 'go' | 'ink';
  label: string;
  hint: string;
}

interface Options {
  use: PullEntryUse;
  pull: PullFrameUse;
  worst: ComputedRef<Verdict | null>;
}

type Translate = ReturnType<typeof useI18n>['t'];

/** What comes after this reading: "then bolt 8", "then turn 90°" at the same bolt, or the next pass. */
export function thenWords(walk: WalkAccess, words: WalkWords, t: Translate): string {
  const [now, next] = nextSlots(walk.state, 2);
  if (!now) return '';
  if (!next) return t('walk.record.last');
  const stage = stageOf(walk.state, next)?.stage;
  if (next.hole === now.hole && slotKey(next) !== slotKey(now) && next.pass === now.pass && stage) {
    return t('walk.record.thenStage', { stage: words.stageAt(stage, next.hole) });
  }
  if (next.pass === now.pass) return t('walk.record.then', { bolt: words.bolt(next.hole) });
  const index = walk.view.passes.findIndex(({ id }) => id === next.pass);
  return t('walk.record.thenPass', { number: index + 1 });
}

const problemWords = (problem: EntryProblem, t: Translate): string =>
  t(`walk.problem.${problem.code}`, { character: problem.character ?? '', suggestion: problem.suggestion ?? '' });

const isSeen = ({ use }: Options, value: string): boolean =>
  use.entry.state.value.shown.value || use.context.value.verdict('value', value) === null;

/** The first figure that is missing or does not read, in words; null where all are there. */
function missing(options: Options, t: Translate): string | null {
  const { use, pull } = options;
  const turn = pull.frame.value.instruction.stage.kind === 'turn';
  for (const field of use.context.value.fields) {
    const figure = figureOf(use.entry.state.value, field);
    // Not judged yet: the button does not say what nobody knows.
    const unseen = field.id === 'value' && figure.ok && !isSeen(options, figure.value);
    const isAsked = field.id === use.entry.state.value.active && !use.entry.complete.value;
    if (!unseen && (figure.ok || (figure.error.code === 'empty' && field.need === 'wanted' && !isAsked))) continue;
    if (figure.ok) return t(turn ? 'walk.record.typeDegrees' : 'walk.record.typeTorque');
    if (figure.error.code !== 'empty') return problemWords(figure.error, t);
    if (field.id === 'endTorque') return t('walk.record.typeEnd');
    if (field.id === 'pulls') return t('walk.record.typePulls');
    return t(turn ? 'walk.record.typeDegrees' : 'walk.record.typeTorque');
  }
  return null;
}

/** Words and kind of the button that records. */
export function useRecordWords(options: Options): RecordWords {
  const { use, pull, worst } = options;
  const walk = useWalkAccess();
  const words = useWalkWords();
  const units = useShownUnits();
  const { t } = useI18n();
  const found = computed<RecordWords>(() => {
    const wait = missing(options, t);
    const figures = use.figures.value;
    if (wait !== null || !figures) return { kind: 'waiting', label: wait ?? '', hint: '' };
    const unit = unitOf(pull.frame.value);
    const value = units.quantity({ value: figures.value, unit }, unit);
    const other = pull.frame.value.other;
    const hint =
      other === null
        ? thenWords(walk, words, t)
        : t('walk.record.forOther', { bolt: words.bolt(holeOf(pull.frame.value)) });
    const verdict = worst.value;
    if (verdict === null || verdict === 'in') return { kind: 'go', label: t('walk.record.in', { value }), hint };
    return { kind: 'ink', label: t(`walk.record.${verdict}`, { value }), hint: '' };
  });
  return reactive({
    kind: computed(() => found.value.kind),
    label: computed(() => found.value.label),
    hint: computed(() => found.value.hint),
  });
}
