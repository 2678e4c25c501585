/** An instant in UTC as events carry it: `2026-03-05T14:03:22Z` or with milliseconds, `2026-03-05T14:03:22.123Z`. */
export type IsoTime = string;

const ISO_UTC = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}:\d{2}(\.\d{3})?Z$/;

/** True for an {@link IsoTime} that names a real instant (30 February and 25:00 are refused). */
export function isIsoTime(text: string): boolean {
  if (!ISO_UTC.test(text)) return false;
  const ms = Date.parse(text);
  // Date.parse lets some engines roll 30 February over into March: the round trip shows it.
  return !Number.isNaN(ms) && new Date(ms).toISOString().slice(0, 19) === text.slice(0, 19);
}

/** Milliseconds since 1970 of an {@link IsoTime}. Throws on anything else. */
export function isoToMs(iso: IsoTime): number {
  if (!isIsoTime(iso)) throw new Error(`Not an instant in UTC: ${iso}`);
  return Date.parse(iso);
}

/** The instant `minutes` later (or earlier, when negative), with milliseconds. */
export function addMinutes(iso: IsoTime, minutes: number): IsoTime {
  return new Date(isoToMs(iso) + minutes * 60_000).toISOString();
}

/** Milliseconds from `from` to `to`; negative when `to` is earlier. */
export function msBetween(from: IsoTime, to: IsoTime): number {
  return isoToMs(to) - isoToMs(from);
}

/** Minutes from `from` to `to`, not rounded; negative when `to` is earlier. */
export function minutesBetween(from: IsoTime, to: IsoTime): number {
  return msBetween(from, to) / 60_000;
}
