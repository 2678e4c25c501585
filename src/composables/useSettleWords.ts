import { useI18n } from 'vue-i18n';
import type { Deviation } from '@shared/walk/deviation';
import type { Offers } from '@shared/walk/offers';
import { nextSlots } from '@shared/walk/route';
import { slotKey, slotsOfHole, stageOf } from '@shared/walk/slots';
import { remainingWindow } from '@shared/walk/instruction';
import type { ReadingRecord } from '@shared/walk/state';
import { marginText } from './headStates';
import { mayHold, type SettleId } from './settleOffers';
import { useShownUnits, type ShownUnits } from './useShownUnits';
import { useWalkAccess, type WalkAccess } from './walkAccess';
import { useWalkWords, type WalkWords } from './useWalkWords';

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

/** Headline, what was read, and the choices of a deviation, all in words. */
export interface SettleWords {
  title: (deviation: Deviation) => string;
  text: (deviation: Deviation) => string;
  /** The figure that is off: end torque, or the total at the hole. */
  value: (deviation: Deviation) => string;
  choice: (id: SettleId, deviation: Deviation, offers: Offers) => SettleChoice;
  notOffered: (offers: Offers) => string;
}

interface Tools {
  walk: WalkAccess;
  words: WalkWords;
  units: ShownUnits;
  t: ReturnType<typeof useI18n>['t'];
}

const isEnd = ({ kind }: Deviation): boolean => kind.startsWith('endTorque');

const readingOf = ({ walk }: Tools, deviation: Deviation): ReadingRecord | undefined =>
  walk.state.readings.find(({ seq }) => seq === deviation.reading);

function valueWords(tools: Tools, deviation: Deviation): string {
  const data = readingOf(tools, deviation)?.data;
  const value = isEnd(deviation) ? data?.endTorque : data?.total;
  return value ? tools.units.quantity(value, value.unit) : '';
}

const nameOf = ({ words, t }: Tools, { hole }: Deviation): { bolt: string; Bolt: string } =>
  hole === null
    ? { bolt: t('walk.joint.the'), Bolt: t('walk.joint.title') }
    : { bolt: words.bolt(hole), Bolt: words.Bolt(hole) };

/** "9°", "4 N·m": how far past the limit, without its sign; empty where there is no figure. */
function byWords(tools: Tools, deviation: Deviation): string {
  const margin = marginText(tools.walk.state, deviation).replace(/^[+\u2212]/, '');
  if (margin === '' || margin.endsWith('°')) return margin;
  const data = readingOf(tools, deviation)?.data;
  const unit = isEnd(deviation) ? data?.endTorque?.unit : data?.window?.unit;
  return unit ? `${margin} ${tools.units.symbol(unit)}` : margin;
}

const measured = new Set<Deviation['kind']>(['over', 'under', 'endTorqueOver', 'endTorqueUnder']);

function titleWords(tools: Tools, deviation: Deviation): string {
  const by = byWords(tools, deviation);
  const key = by !== '' && measured.has(deviation.kind) ? `${deviation.kind}By` : deviation.kind;
  return tools.t(`walk.headline.${key}`, { Bolt: nameOf(tools, deviation).Bolt, by });
}

function textWords(tools: Tools, deviation: Deviation): string {
  const { t, units } = tools;
  const data = readingOf(tools, deviation)?.data;
  const value = valueWords(tools, deviation);
  const turned = data?.total.unit === 'deg' && !isEnd(deviation);
  return [
    deviation.note ?? '',
    value && t(turned ? 'walk.settle.turned' : 'walk.settle.pulled', { value }),
    data?.window && !isEnd(deviation)
      ? t('walk.settle.window', { window: units.limits(data.window, data.window.unit) })
      : '',
    t(deviation.hole === null ? 'walk.settle.choose' : 'walk.settle.wrenchOff'),
  ]
    .filter(Boolean)
    .join(' ');
}

/** Stages that a fastener goes through again, up to where it stood: "30 N·m", "60 N·m", "turn 90°". */
function stepsAgain({ walk, words }: Tools, { hole, slot }: Deviation): string[] {
  if (hole === null) return [];
  const slots = slotsOfHole(walk.state, hole);
  const upTo = slot ? slots.findIndex((each) => slotKey(each) === slotKey(slot)) : -1;
  const again = slots.slice(0, upTo + 1).map((each) => stageOf(walk.state, each)?.stage);
  return again.flatMap((stage) => (stage ? [words.stageAt(stage, hole)] : []));
}

function nextWords({ walk, words, t }: Tools, deviation: Deviation): string {
  const next = nextSlots(walk.state, 3).find((slot) => slot.hole !== deviation.hole);
  return next ? t('walk.settle.then', { bolt: words.bolt(next.hole) }) : '';
}

function remainingWords(tools: Tools, deviation: Deviation): Record<string, string> {
  const data = readingOf(tools, deviation)?.data;
  const rest = data?.window?.unit === 'deg' ? remainingWindow(data.window, data.total) : null;
  return rest ? { more: rest.target, low: rest.low, high: rest.high } : { more: '', low: '', high: '' };
}

function choiceWords(tools: Tools, id: SettleId, deviation: Deviation, offers: Offers): SettleChoice {
  const { t, words, walk } = tools;
  const values = {
    ...nameOf(tools, deviation),
    fresh: words.newBolt(deviation.hole ?? walk.state.procedure.holes[0]?.id ?? ''),
    value: valueWords(tools, deviation),
    ...remainingWords(tools, deviation),
  };
  const isTurn = readingOf(tools, deviation)?.data.total.unit === 'deg';
  const form = id === 'pullAgain' && !isTurn ? 'pullAgainTorque' : id;
  const orHold = id === 'accept' && mayHold(deviation, offers) ? t('walk.settle.orHold') : '';
  const base = {
    id,
    title: t(`walk.settle.${form}.title`, values),
    consequence: [t(`walk.settle.${form}.then`, values), orHold].filter(Boolean).join(' '),
    main: t(`walk.settle.${form}.main`, values),
  };
  if (id !== 'replace' && id !== 'restart') return base;
  return { ...base, steps: stepsAgain(tools, deviation), after: nextWords(tools, deviation) };
}

const notOfferedWords = ({ t }: Tools, { notOffered }: Offers): string =>
  notOffered
    .map(({ choice, why }) =>
      t('walk.settle.not', { choice: t(`walk.settle.name.${choice}`), why: t(`walk.settle.why.${why}`) }),
    )
    .join(' ');

/** A deviation in words. */
export function useSettleWords(): SettleWords {
  const tools: Tools = { walk: useWalkAccess(), words: useWalkWords(), units: useShownUnits(), t: useI18n().t };
  return {
    title: (deviation) => titleWords(tools, deviation),
    text: (deviation) => textWords(tools, deviation),
    value: (deviation) => valueWords(tools, deviation),
    choice: (id, deviation, offers) => choiceWords(tools, id, deviation, offers),
    notOffered: (offers) => notOfferedWords(tools, offers),
  };
}
