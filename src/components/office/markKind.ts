/** Signs of states: each a shape of its own, so that colour is never the only bearer. */
export type MarkKind = 'no' | 'look' | 'waits' | 'half' | 'away' | 'free' | 'done' | 'gone';
