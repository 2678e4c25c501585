import { sealEvent } from '@shared/record/chain';
import type { RecordCrypto, Signer } from '@shared/record/crypto';
import { OFFICE, ZERO_HASH, type SignedEvent } from '@shared/record/envelope';
import type { WalkEvent } from '@shared/walk/events';
import { sealMeaning } from '@shared/walk/sealMeaning';
import { openBook, wantsSeal, withSeal, type Draft, type WalkBook, type WalkSetting } from './walkBook';
import { walkDrafts, type WalkPlan } from './walkOn';

/** What a PIN is sealed for (decision 6). */
export interface SealFor {
  walk: string;
  seq: number;
  prev: string;
  person: string;
  meaning: string;
}

/** Who signs, and how PINs are sealed: `seal` gives the SHA-256 (hex) of what travels beside the batch. */
export interface WalkHand {
  shop: string;
  walk: string;
  tablet: Signer;
  /** The shop's key, for events of the office. */
  office?: Signer;
  crypto: RecordCrypto;
  seal: (what: SealFor) => Promise<string>;
}

/** A walk being written for the record: each event hashed, chained and signed as it is made. */
export interface WalkLog {
  readonly book: WalkBook;
  readonly hand: WalkHand;
  readonly signed: readonly SignedEvent[];
  /** Decides, seals, signs and appends; throws with the refusal's code. */
  issue(draft: Draft): Promise<WalkEvent>;
}

/** A new log before its first event. */
export function openLog(setting: WalkSetting, hand: WalkHand): WalkLog {
  const book = openBook(setting);
  const signed: SignedEvent[] = [];
  const { shop, walk, crypto } = hand;
  return {
    book,
    hand,
    signed,
    issue: async (draft) => {
      const prev = signed.at(-1)?.hash ?? ZERO_HASH;
      const seq = book.state.seq + 1;
      const seal = wantsSeal(draft)
        ? await hand.seal({ walk, seq, prev, person: draft.by, meaning: sealMeaning(draft) })
        : '';
      const event = book.issue(withSeal(draft, seal));
      const signer = event.tablet === OFFICE ? hand.office : hand.tablet;
      if (!signer) throw new Error('no key of the shop to sign an event of the office');
      signed.push(await sealEvent({ v: 1, shop, walk, prev, ...event }, signer, crypto));
      return event;
    },
  };
}

/** Walks on for the record, as `walkDrafts` does. Every refusal throws. */
export async function walkOn(log: WalkLog, plan: WalkPlan = {}): Promise<void> {
  for (const draft of walkDrafts(log.book, plan)) await log.issue(draft);
}
