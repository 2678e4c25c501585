import type { Locale } from '../quantity/format';

/** Whose calendar is read: language of the months, and the zone the shop stands in. */
export interface TimeReader {
  language: Locale;
  timeZone: string;
}

// Written here and not asked of Intl: the same proof has to give the same bytes with every version of its data.
const MONTHS: Readonly<Record<Locale, readonly string[]>> = {
  en: ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'],
  es: ['ene', 'feb', 'mar', 'abr', 'may', 'jun', 'jul', 'ago', 'sep', 'oct', 'nov', 'dic'],
};

interface Moment {
  year: number;
  month: number;
  day: number;
  hour: number;
  minute: number;
  utc: boolean;
}

function zoned(iso: string, timeZone: string): Moment {
  const options = { year: 'numeric', month: 'numeric', day: 'numeric', hour: 'numeric', minute: 'numeric' } as const;
  const parts = new Intl.DateTimeFormat('en-US', { ...options, timeZone, hourCycle: 'h23' }).formatToParts(
    Date.parse(iso),
  );
  const get = (type: string): number => Number(parts.find((part) => part.type === type)?.value);
  const [year, month, day] = [get('year'), get('month'), get('day')];
  return { year, month, day, hour: get('hour'), minute: get('minute'), utc: false };
}

/** An unknown zone reads as UTC and says so: a wrong hour would be worse than a strange one. */
function momentOf(iso: string, timeZone: string): Moment | null {
  if (Number.isNaN(Date.parse(iso))) return null;
  try {
    return zoned(iso, timeZone);
  } catch {
    return { ...zoned(iso, 'UTC'), utc: true };
  }
}

const two = (value: number): string => String(value).padStart(2, '0');
const dateText = ({ day, month, year }: Pick<Moment, 'day' | 'month' | 'year'>, language: Locale): string =>
  `${day} ${MONTHS[language][month - 1] ?? ''} ${year}`;
const clockText = ({ hour, minute, utc }: Moment): string => `${two(hour)}:${two(minute)}${utc ? ' UTC' : ''}`;

/** `14 Jun 2026, 09:12` in the shop's zone. What is no instant is given back as it is. */
export function formatTime(iso: string, { language, timeZone }: TimeReader): string {
  const moment = momentOf(iso, timeZone);
  return moment ? `${dateText(moment, language)}, ${clockText(moment)}` : iso;
}

/** `14 Jun 2026`, of a calendar day or an instant in the shop's zone. What is neither is given back as it is. */
export function formatDay(text: string, { language, timeZone }: TimeReader): string {
  const day = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text);
  if (day) return dateText({ year: Number(day[1]), month: Number(day[2]), day: Number(day[3]) }, language);
  const moment = momentOf(text, timeZone);
  return moment ? dateText(moment, language) : text;
}

/** `13 Jun 2026, 13:40 – 14:26`; the day is written twice where it changes. */
export function formatSpan(from: string, to: string, reader: TimeReader): string {
  const [begun, ended] = [momentOf(from, reader.timeZone), momentOf(to, reader.timeZone)];
  if (!begun || !ended) return `${from} – ${to}`;
  const sameDay = dateText(begun, 'en') === dateText(ended, 'en');
  return `${formatTime(from, reader)} – ${sameDay ? clockText(ended) : formatTime(to, reader)}`;
}

/** `13:58` in the shop's zone. */
export function formatClock(iso: string, reader: TimeReader): string {
  const moment = momentOf(iso, reader.timeZone);
  return moment ? clockText(moment) : iso;
}
