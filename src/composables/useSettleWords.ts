import { useI18n } from 'vue-i18n';
import type { Deviation } from '@shared/walk/deviation';
import type { Choice as ChoiceId } from '@shared/walk/events';
import type { Offers } from '@shared/walk/offers';
import { nextSlots } from '@shared/walk/route';
import { holeById, slotsOfHole, slotKey, stageOf } from '@shared/walk/slots';
import { remainingWindow } from '@shared/walk/instruction';
import type { ReadingRecord } from '@shared/walk/state';
import { marginText } from './headStates';
import { useShownUnits } from './useShownUnits';
import { useWalkAccess } from './walkAccess';
import { useWalkWords } from './useWalkWords';

/** What may be chosen about a deviation, and two ways that are no decision: typed wrong, and no longer held. */
export type SettleId = ChoiceId | 'typedWrong' | 'withdraw';

/** One way out as the list shows it. */
export interface SettleChoice {
  id: SettleId;
  title: string;
  consequence: string;
  steps?: string[];
  after?: string;
  /** What the main button says once it is chosen. */
  main: string;
}

/** Which choices ask for a reason first, and from which list of usual ones. */
export const reasonKind = (id: SettleId): 'accept' | 'asItIs' | 'hold' | 'answered' | 'looked' | 'typed' | null => {
  if (id === 'typedWrong') return 'typed';
  return id === 'accept' || id === 'asItIs' || id === 'hold' || id === 'answered' || id === 'looked' ? id : null;
};

/** A held deviation is decided by a supervisor: accept, renew, or take the hold back (R9). */
const whileHeld = new Set<SettleId>(['accept', 'restart', 'replace', 'restartJoint']);

/** Ids in the order of the list. */
export function offeredIds(deviation: Deviation, offers: Offers): SettleId[] {
  const order: SettleId[] = [...offers.offered];
  // Whoever may look at it and leave it may also have it accepted on the spot (R8).
  if (order.includes('asItIs') && !order.includes('accept')) order.push('accept');
  if (deviation.status === 'held') return [...order.filter((id) => whileHeld.has(id)), 'withdraw'];
  return offers.mayVoid ? [...order, 'typedWrong'] : order;
}

/** Headline, what was read, and the choices of a deviation, all in words. */
export function useSettleWords() {
  const walk = useWalkAccess();
  const words = useWalkWords();
  const units = useShownUnits();
  const { t } = useI18n();

  const readingOf = (deviation: Deviation): ReadingRecord | undefined =>
    walk.state.readings.find(({ seq }) => seq === deviation.reading);

  /** What was read, the figure that is off: end torque, or the total at the hole. */
  function valueWords(deviation: Deviation): string {
    const data = readingOf(deviation)?.data;
    const value = deviation.kind.startsWith('endTorque') ? data?.endTorque : data?.total;
    return value ? units.quantity(value, value.unit) : '';
  }

  /** Stages that a fastener goes through again, up to where it stood: "30 N·m", "60 N·m", "turn 90°". */
  function stepsAgain(deviation: Deviation): string[] {
    const { hole, slot } = deviation;
    if (hole === null) return [];
    const slots = slotsOfHole(walk.state, hole);
    const upTo = slot ? slots.findIndex((each) => slotKey(each) === slotKey(slot)) : -1;
    const again = slots.slice(0, upTo + 1).map((each) => stageOf(walk.state, each)?.stage);
    return again.flatMap((stage) => (stage ? [words.stageAt(stage, hole)] : []));
  }

  function nextWords(deviation: Deviation): string {
    const next = nextSlots(walk.state, 3).find((slot) => slot.hole !== deviation.hole);
    return next ? t('walk.settle.then', { bolt: words.bolt(next.hole) }) : '';
  }

  function remainingWords(deviation: Deviation): Record<string, string> {
    const reading = readingOf(deviation);
    const window = reading?.data.window;
    const rest = window?.unit === 'deg' ? remainingWindow(window, reading?.data.total ?? null) : null;
    return rest ? { more: rest.target, low: rest.low, high: rest.high } : { more: '', low: '', high: '' };
  }

  function choice(id: SettleId, deviation: Deviation): SettleChoice {
    const { hole } = deviation;
    const values = {
      bolt: hole === null ? '' : words.bolt(hole),
      Bolt: hole === null ? '' : words.Bolt(hole),
      fresh: words.newBolt(hole ?? walk.state.procedure.holes[0]?.id ?? ''),
      value: valueWords(deviation),
      ...remainingWords(deviation),
    };
    const isTurn = readingOf(deviation)?.data.total.unit === 'deg';
    const form = id === 'pullAgain' && !isTurn ? 'pullAgainTorque' : id;
    const base = {
      id,
      title: t(`walk.settle.${form}.title`, values),
      consequence: t(`walk.settle.${form}.then`, values),
      main: t(`walk.settle.${form}.main`, values),
    };
    if (id !== 'replace' && id !== 'restart') return base;
    return { ...base, steps: stepsAgain(deviation), after: nextWords(deviation) };
  }

  function title(deviation: Deviation): string {
    const { kind, hole } = deviation;
    const margin = marginText(walk.state, deviation).replace(/^[+\u2212]/, '');
    const unit = readingOf(deviation)?.data.total.unit;
    const off = kind.startsWith('endTorque') || unit !== 'deg' ? readingUnit(deviation) : '';
    const by = margin === '' ? '' : `${margin}${off === '' ? '' : ` ${off}`}`;
    const key = by !== '' && ['over', 'under', 'endTorqueOver', 'endTorqueUnder'].includes(kind) ? `${kind}By` : kind;
    const values = { bolt: hole === null ? '' : words.bolt(hole), Bolt: hole === null ? '' : words.Bolt(hole), by };
    return t(`walk.headline.${key}`, values);
  }
  function readingUnit(deviation: Deviation): string {
    const data = readingOf(deviation)?.data;
    const unit = deviation.kind.startsWith('endTorque') ? data?.endTorque?.unit : data?.window?.unit;
    return unit ? units.symbol(unit) : '';
  }

  function text(deviation: Deviation): string {
    const data = readingOf(deviation)?.data;
    const parts = [deviation.note ?? ''];
    if (data) {
      const group = holeById(walk.state.procedure, data.hole)?.group;
      const value = valueWords(deviation);
      const turned = data.total.unit === 'deg' && !deviation.kind.startsWith('endTorque');
      if (group !== undefined && value) parts.push(t(turned ? 'walk.settle.turned' : 'walk.settle.pulled', { value }));
      if (data.window && !deviation.kind.startsWith('endTorque')) {
        parts.push(t('walk.settle.window', { window: units.limits(data.window, data.window.unit) }));
      }
    }
    parts.push(t(deviation.hole === null ? 'walk.settle.choose' : 'walk.settle.wrenchOff'));
    return parts.filter(Boolean).join(' ');
  }

  const notOffered = (offers: Offers): string =>
    offers.notOffered.map(({ choice: id, why }) => t('walk.settle.not', { choice: t(`walk.settle.name.${id}`), why: t(`walk.settle.why.${why}`) })).join(' ');

  return { title, text, choice, notOffered, valueWords };
}
