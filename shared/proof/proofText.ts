import { phrase, say, word, type Phrase, type Speaker } from './phrase';
import { formatClock, formatDay } from './proofTime';
import type { ProofDocument } from './proofDocument';
import type { ProofDeviation, ProofLine, ProofPlace, ProofSignature, ProofWrench } from './sheet';
import type { PhraseKey } from './words/en';

/** One entry of a list: where it was, and what there is to say about it. */
export interface ProofEntry {
  where: string;
  lines: string[];
}

const MINUTE_MS = 60_000;
/** Sooner than this a signature was not late in any way that matters. */
const LEAST_DELAY_MS = 5 * MINUTE_MS;

/** `bolt 5 · pass 3`. */
export function placeText(place: ProofPlace, speaker: Speaker): string {
  const key: PhraseKey = place.label === null ? 'at.joint' : `at.${place.noun}`;
  const where = say(phrase(key, { label: place.label ?? '' }), speaker);
  if (place.pass === null) return where;
  if (place.round === null) return say(phrase('at.pass', { where, pass: place.pass }), speaker);
  return say(phrase('at.round', { where, pass: place.pass, round: place.round }), speaker);
}

/** A deviation with every decision about it and the time of each (D1). */
export function deviationEntry({ place, found, at, settlings }: ProofDeviation, speaker: Speaker): ProofEntry {
  const timed = (said: Phrase, when: string): string => `${say(said, speaker)} (${formatClock(when, speaker)})`;
  return {
    where: placeText(place, speaker),
    lines: [timed(found, at), ...settlings.map((settling) => timed(settling.said, settling.at))],
  };
}

/** Something voided, changed, entered later, or no longer standing. */
export const lineEntry = ({ place, said }: ProofLine, speaker: Speaker): ProofEntry => ({
  where: placeText(place, speaker),
  lines: [say(said, speaker)],
});

/** `in date, scanned, 28 readings`: how a wrench stood when it was used (D2). */
export function wrenchUse(wrench: ProofWrench, speaker: Speaker): string {
  const { language } = speaker;
  const parts = [
    word(wrench.inDate ? 'wrench.inDate' : 'wrench.lapsed', language),
    word(wrench.how === 'scanned' ? 'wrench.scanned' : 'wrench.picked', language),
  ];
  if (wrench.allowedBy !== null)
    parts.push(say(phrase('wrench.override', { person: { person: wrench.allowedBy } }), speaker));
  for (const tag of wrench.adapters) parts.push(say(phrase('wrench.adapter', { tag }), speaker));
  if (wrench.out !== null) parts.push(word(`wrench.${wrench.out}`, language));
  parts.push(say(phrase('wrench.used', { n: wrench.readings }), speaker));
  return parts.join(', ');
}

/** `27 Sep 2026 or 5000 cycles`; each half stays on one line. */
export function wrenchDue({ due }: ProofWrench, speaker: Speaker): string {
  const parts: string[] = [];
  if (due.date !== null) parts.push(formatDay(due.date, speaker));
  if (due.cycles !== null) parts.push(say(phrase('wrench.cycles', { cycles: due.cycles }), speaker));
  return parts.map((part) => part.replaceAll(' ', '\u00a0')).join(' ') || word('wrench.noDue', speaker.language);
}

function delayPhrase(ms: number): Phrase {
  const minutes = Math.round(ms / MINUTE_MS);
  if (minutes < 120) return phrase('delay.minutes', { n: minutes });
  const hours = Math.round(minutes / 60);
  return hours < 48 ? phrase('delay.hours', { n: hours }) : phrase('delay.days', { n: Math.round(hours / 24) });
}

/** What somebody states with a signature, in the quotation marks of the language. */
export function meaningText({ meaning }: ProofSignature, { language }: Speaker): string {
  const said = word(`meaning.${meaning}`, language);
  return language === 'en' ? `“${said}”` : `«${said}»`;
}

/** Who signed, and as what. */
export function signerText({ by, role }: ProofSignature, speaker: Speaker): string {
  return say(phrase('sign.line', { person: { person: by }, role: word(`role.${role}`, speaker.language) }), speaker);
}

/** Time, place, delay and the shop's word on the PIN, one line each (D2). */
export function signatureLines(sign: ProofSignature, speaker: Speaker): string[] {
  const time = { time: sign.at };
  const lines = [
    sign.tablet === null ? phrase('sign.office', { time }) : phrase('sign.tablet', { time, tablet: sign.tablet }),
  ];
  const late = sign.received === null ? 0 : Date.parse(sign.received) - Date.parse(sign.at);
  if (sign.tablet !== null && late >= LEAST_DELAY_MS)
    lines.push(phrase('sign.delay', { delay: { phrase: delayPhrase(late) } }));
  if (sign.confirmed !== null) lines.push(phrase('sign.pin', { time: { time: sign.confirmed } }));
  return lines.map((line) => say(line, speaker));
}

/** What people wrote down, and how many photographs are kept. */
export function noteLines({ note, sheet }: ProofDocument, speaker: Speaker): string[] {
  const { notes, photos } = sheet;
  const said = notes.map(({ by, at, text }) =>
    say(phrase('note.row', { person: { person: by }, time: { time: at }, text }), speaker),
  );
  const kept = photos > 0 ? [say(phrase('photos.count', { n: photos }), speaker)] : [];
  return [...(note === '' ? [] : [note]), ...said, ...kept];
}

/** A hash in groups of four, as somebody reads it out. */
export const groupedHash = (hash: string): string => hash.match(/.{1,4}/g)?.join(' ') ?? '';
