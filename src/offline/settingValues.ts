import type { EnrolledTablet } from '@shared/contracts/tablets.contract';
import type { PublicJwk } from '@shared/record/crypto';
import type { Catalogue } from './catalogue';

/** The tablet's own key. The private half cannot be read out, not even by this program. */
export interface DeviceKey {
  kid: string;
  publicJwk: PublicJwk;
  privateKey: CryptoKey;
}

/** Who this tablet is: what the server said when it was enrolled. The bearer token is never kept. */
export type TabletIdentity = Pick<EnrolledTablet, 'tablet' | 'shop' | 'signingKeys' | 'sealingKey'> & {
  enrolledAt: string;
};

/** What is kept of a person's PIN (decision 10): made at the first sign-in, which the server checked. */
export interface PinVerifier {
  person: string;
  pinVersion: number;
  salt: Uint8Array<ArrayBuffer>;
  iterations: number;
  mac: Uint8Array<ArrayBuffer>;
}

/** Wrong tries of a person on this tablet. A try is counted before it is compared. */
export interface PinTries {
  failures: number;
  /** Device time of the last counted try, ms since 1970. */
  lastAt: number;
}

/** When the server was last heard, and the latest time this tablet has seen (a clock set back shows). */
export interface ClockRecord {
  lastContact: number;
  latestSeen: number;
  /** Server's clock minus the tablet's at the last contact, ms. */
  serverOffset: number;
}

/** Who is signed in at this tablet. Outlives a kill: nobody signs in again inside a pass (W9). */
export interface StandSession {
  person: string;
  since: string;
}

/** What is typed but not yet said: kept so that nothing entered is lost. */
export interface Draft {
  savedAt: string;
  value: unknown;
}

/** Everything in the settings, by key. */
export interface SettingValues {
  deviceKey: DeviceKey;
  tablet: TabletIdentity;
  catalogue: Catalogue;
  pinKey: CryptoKey;
  clock: ClockRecord;
  session: StandSession;
  /** Walks of which this tablet lost events that the server has (fault 20); told until somebody has read it. */
  lostWalks: string[];
  [draft: `draft:${string}`]: Draft;
  [verifier: `pin:${string}`]: PinVerifier;
  [tries: `tries:${string}`]: PinTries;
}
