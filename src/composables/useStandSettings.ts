import { reactive, watch } from 'vue';
import type { TorqueUnit } from '@shared/quantity/unit';

/** How this tablet looks and which hand taps it. Looks only: nothing here is part of any record. */
export interface StandSettings {
  theme: 'system' | 'light' | 'dim';
  hand: 'right' | 'left';
  torqueUnit: TorqueUnit | 'asWritten';
  locale: 'en' | 'es';
}

const KEY = 'boltwalk-looks';

const allowed: { [K in keyof StandSettings]: readonly StandSettings[K][] } = {
  theme: ['system', 'light', 'dim'],
  hand: ['right', 'left'],
  torqueUnit: ['asWritten', 'N.m', 'lbf.ft', 'lbf.in', 'kgf.m'],
  locale: ['en', 'es'],
};

const first = (language: string): StandSettings => ({
  theme: 'system',
  hand: 'right',
  torqueUnit: 'asWritten',
  locale: language.toLowerCase().startsWith('es') ? 'es' : 'en',
});

/** What was kept, each value checked: an older or a foreign entry falls back to what a new tablet has. */
export function settingsFrom(text: string | null, language: string): StandSettings {
  const settings = first(language);
  let kept: unknown;
  try {
    kept = JSON.parse(text ?? 'null');
  } catch {
    // Cut off or written by something else: looks are chosen again in a moment, nothing of a walk hangs on them.
    return settings;
  }
  if (typeof kept !== 'object' || kept === null) return settings;
  for (const name of Object.keys(allowed) as (keyof StandSettings)[]) {
    const value = (kept as Record<string, unknown>)[name];
    if ((allowed[name] as readonly unknown[]).includes(value)) Object.assign(settings, { [name]: value });
  }
  return settings;
}

let shared: StandSettings | null = null;

/** The tablet's looks, one set for all screens, kept in this browser. */
export function useStandSettings(): StandSettings {
  if (shared) return shared;
  const settings = reactive(settingsFrom(window.localStorage.getItem(KEY), window.navigator.language));
  watch(settings, (now) => window.localStorage.setItem(KEY, JSON.stringify(now)), { flush: 'sync' });
  shared = settings;
  return settings;
}
