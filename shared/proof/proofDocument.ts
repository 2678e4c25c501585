import type { ProcedureDocument } from '../procedure/procedure';
import type { Role } from '../people/roles';
import type { Locale } from '../quantity/format';
import type { PublicJwk } from '../record/crypto';
import type { SignedEvent } from '../record/envelope';
import type { ProofSheet } from './sheet';

/** A tablet that wrote events of this walk; its key was known to the shop, and the shop signs that here. */
export interface ProofTablet {
  id: string;
  name: string;
  kid: string;
  jwk: PublicJwk;
}

/** The roles of a person from a catalogue cursor on, in growing order: what an event could know (decision 1). */
export interface ProofRoles {
  person: string;
  since: number;
  roles: Role[];
}

/** What the shop said about a sealed PIN (decision 6); `jws` is detached, over the RFC 8785 text of the other fields. */
export interface ProofConfirmation {
  walk: string;
  branch: number;
  seq: number;
  hash: string;
  person: string;
  meaning: string;
  result: 'accepted' | 'refused';
  reason: string | null;
  at: string;
  jws: string;
}

/** Everything that is checked: the events of the branch that stands, from the first on, and who could have made them. */
export interface ProofRecord {
  events: SignedEvent[];
  /** When the shop's server had each event; only the shop vouches for it. */
  received: string[];
  tablets: ProofTablet[];
  roles: ProofRoles[];
  confirmations: ProofConfirmation[];
}

/** Engine and job, as far as they are nobody's personal data; the rest is in the side sheet. */
export interface ProofJob {
  number: string;
  engine: { family: string; model: string; serial: string };
  odometer: { value: string; unit: 'km' | 'mi' } | null;
  hours: string | null;
  bank: string;
  castingNumber: string;
}

/** The document the shop signs once, at issue (decision 16). */
export interface ProofDocument {
  format: 'boltwalk.proof';
  version: 1;
  number: string;
  /** From 1; a note, a doubt or a correction is a new issue of the same number. */
  issue: number;
  issuedAt: string;
  language: Locale;
  timeZone: string;
  publicUrl: string;
  note: string;
  shop: { id: string; name: string; address: string };
  job: ProofJob;
  procedure: { revision: number; hash: string; approvedAt: string | null; document: ProcedureDocument };
  record: ProofRecord;
  /** Digests of the side sheet's lines, sorted: names, VIN, customer and claim can be withheld and still be signed. */
  side: string[];
  sheet: ProofSheet;
}
