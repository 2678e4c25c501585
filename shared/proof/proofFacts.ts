import { formatDecimal, type Locale } from '../quantity/format';
import { phrase, say, word, type Speaker } from './phrase';
import type { ProofDocument } from './proofDocument';
import { formatDay, formatSpan } from './proofTime';
import type { ProofPart } from './sheet';
import type { SideSheet } from './sideSheet';
import type { PhraseKey } from './words/en';

/** A label and what is said under it. `isCode`: figures and codes, set in the face for figures. */
export interface ProofFact {
  key: PhraseKey | `part:${string}`;
  label: string;
  value: string;
  isCode: boolean;
}

/** Who reads this proof: names as far as they are shown, else *technician 1*, *supervisor 1* in order of appearance. */
export function speakerFor(document: ProofDocument, side: SideSheet, language: Locale): Speaker {
  const { people } = document.sheet;
  const numbered = (person: string): string => {
    const role = people.find((one) => one.person === person)?.role ?? 'technician';
    const alike = people.filter((one) => one.role === role).map((one) => one.person);
    return say(phrase(`person.${role}`, { n: alike.indexOf(person) + 1 }), speaker);
  };
  const speaker: Speaker = {
    language,
    timeZone: document.timeZone,
    nameOf: (person) => side.names[person] ?? numbered(person),
  };
  return speaker;
}

/** Thousands apart from 10 000 on, as the language writes them. */
function grouped(value: string, language: Locale): string {
  const [whole = '', decimals] = value.split('.');
  const apart = whole.replace(/\B(?=(\d{3})+$)/g, language === 'en' ? ',' : ' ');
  return decimals === undefined ? apart : `${apart}${formatDecimal(`.${decimals}`, language)}`;
}

const dotted = (...parts: (string | undefined)[]): string => parts.filter((part) => part).join(' · ');

function vinText({ vinHead, vinTail }: SideSheet, speaker: Speaker): string | null {
  if (vinTail === undefined) return null;
  return vinHead === undefined ? say(phrase('fact.vinEnds', { tail: vinTail }), speaker) : vinHead + vinTail;
}

function jointText({ job, procedure, sheet }: ProofDocument, speaker: Speaker): string {
  const purpose = sheet.purpose === 'finalAssembly' ? '' : say(phrase(`purpose.${sheet.purpose}`), speaker);
  const bank = job.bank && say(phrase('fact.bank', { bank: job.bank }), speaker);
  const casting = job.castingNumber && say(phrase('fact.casting', { casting: job.castingNumber }), speaker);
  return dotted(procedure.document.component, bank, casting, purpose);
}

function procedureText({ procedure }: ProofDocument, speaker: Speaker): string {
  const params = { code: procedure.document.code, revision: procedure.revision };
  return procedure.approvedAt === null
    ? say(phrase('fact.procedureText', params), speaker)
    : say(phrase('fact.procedureApproved', { ...params, day: { day: procedure.approvedAt } }), speaker);
}

function manualText({ procedure }: ProofDocument, speaker: Speaker): string {
  const { title, page, date } = procedure.document.source;
  const text = say(phrase('fact.manualText', { title, page, date: formatDay(date, speaker) }), speaker);
  return procedure.document.toleranceIsShops ? dotted(text, word('sheet.shopTolerance', speaker.language)) : text;
}

function odometerText({ job }: ProofDocument, speaker: Speaker): string {
  const { odometer, hours } = job;
  return dotted(
    odometer ? `${grouped(odometer.value, speaker.language)} ${odometer.unit}` : '',
    hours === null ? '' : say(phrase('fact.hoursText', { hours }), speaker),
  );
}

/** A name that ends with its own part number need not say it twice. */
const withoutNumber = (name: string, parts: readonly ProofPart[]): string =>
  parts.reduce((short, { partNumber }) => short.replace(` ${partNumber}`, ''), name);

/** Batches of one part together: `15 fitted, OD6-HB14, batch 5520-K and 5521-K`. */
function partFacts(parts: readonly ProofPart[], speaker: Speaker): ProofFact[] {
  const names = [...new Set(parts.map(({ name }) => name))];
  return names.map((name) => {
    const own = parts.filter((part) => part.name === name);
    const fitted = own[0]?.fitted;
    const list = (values: string[]) => ({ list: [...new Set(values)], join: 'and' as const });
    const value = phrase('fact.partText', {
      fitted: fitted ? { phrase: phrase('fact.partFitted', { n: fitted }) } : '',
      number: list(own.map(({ partNumber }) => partNumber)),
      batch: list(own.map(({ batch }) => batch)),
    });
    return { key: `part:${name}`, label: withoutNumber(name, own), value: say(value, speaker), isCode: false };
  });
}

/** Everything the page says about engine, job, procedure and parts, in its order; what is unknown is left out (D2). */
export function proofFacts(document: ProofDocument, side: SideSheet, speaker: Speaker): ProofFact[] {
  const { language } = speaker;
  const { job, sheet } = document;
  const { family, model, serial } = job.engine;
  const fact = (key: PhraseKey, value: string | null | undefined, isCode = false): ProofFact[] =>
    value ? [{ key, label: word(key, language), value, isCode }] : [];
  const judged = sheet.policy.judgement === 'simple' ? 'sheet.judgedSimple' : 'sheet.judgedGuarded';
  return [
    ...fact('fact.engine', dotted(`${family} ${model}`.trim(), serial)),
    ...fact('fact.job', job.number, true),
    ...fact('fact.vehicle', vinText(side, speaker), side.vinHead !== undefined),
    ...fact('fact.claim', side.claim),
    ...fact('fact.joint', jointText(document, speaker)),
    ...fact('fact.walked', formatSpan(sheet.walked.from, sheet.walked.to, speaker)),
    ...fact('fact.procedure', procedureText(document, speaker)),
    ...fact('fact.odometer', odometerText(document, speaker)),
    ...fact('fact.manual', manualText(document, speaker)),
    ...fact('fact.customer', side.customer),
    ...partFacts(sheet.parts, speaker),
    ...fact('fact.judged', word(judged, language)),
  ];
}
