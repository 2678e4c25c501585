/** What a sign says; every kind has a shape of its own, so that colour is never the only bearer. */
export type VerdictKind = 'in' | 'over' | 'under' | 'lookAgain' | 'apart' | 'accepted' | 'error';
