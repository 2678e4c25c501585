import { computed, ref, shallowRef } from 'vue';
import type { SavedProof } from '@shared/proof/savedProof';
import { verifyProof, type ProofCheck, type VerifyTools } from '@shared/proof/verifyProof';
import type { PublicJwk } from '@shared/record/crypto';
import { recordCryptoFrom } from '@shared/record/recordCryptoFrom';
import { fetchProof, fetchShopKeys, readProofFile, type FetchProblem, type Found } from './proofSource';
import { problemsOf, type ProofOrigin } from './proofVerdict';

/** What the page shows just now. */
export type PageState = 'idle' | 'loading' | 'checking' | 'done' | 'error';

/** Why there is nothing to show; `secure`: the browser checks no signature on a page that came without https. */
export type PageFailure = FetchProblem | { code: 'secure' };

/** Everything that is checked: the sealed text, the keys it is held against, where it came from. */
interface Work {
  saved: SavedProof;
  keys: PublicJwk[];
  stored: string[] | null;
  origin: ProofOrigin;
}

/** Lets the page paint between two stretches of work. */
const painted = (): Promise<void> => new Promise((resolve) => setTimeout(resolve));

/** Shop of a sealed proof, before anything in it is believed: only to know whose keys to ask for. */
function shopIn(sealed: string): string | null {
  try {
    const payload = (sealed.split('.')[1] ?? '').replaceAll('-', '+').replaceAll('_', '/');
    const document = JSON.parse(atob(payload)) as { shop?: { id?: unknown } };
    return typeof document.shop?.id === 'string' ? document.shop.id : null;
  } catch {
    return null;
  }
}

/** Asks the shop for a proof and its keys. */
async function workOfLink(token: string): Promise<Found<Work>> {
  const found = await fetchProof(token);
  if (!found.ok) return found;
  const { jws, keys: own, stored, shop } = found.value;
  const keys = (await fetchShopKeys(shop.id)) ?? own;
  const origin: ProofOrigin = { kind: 'link', answer: found.value, askedAt: new Date().toISOString() };
  return { ok: true, value: { saved: { sealed: jws, keys }, keys, stored, origin } };
}

/** Reads a saved proof; asks for the shop's keys where the shop can be asked. */
async function workOfFile(file: File): Promise<Found<Work>> {
  const found = await readProofFile(file);
  if (!found.ok) return found;
  const shop = shopIn(found.value.sealed);
  const asked = shop === null ? null : await fetchShopKeys(shop);
  const origin: ProofOrigin = { kind: 'file', name: file.name, keysAsked: asked !== null };
  return { ok: true, value: { saved: found.value, keys: asked ?? found.value.keys, stored: null, origin } };
}

type Progress = NonNullable<VerifyTools['progress']>;

/** Checks in this browser; null where it will not check signatures on such a page. */
async function checkHere(work: Work, progress: Progress): Promise<ProofCheck | null> {
  const subtle = globalThis.crypto?.subtle as SubtleCrypto | undefined;
  if (!subtle) return null;
  const crypto = recordCryptoFrom(subtle);
  return verifyProof(work.saved.sealed, { crypto, shopKeys: work.keys, storedHashes: work.stored, progress });
}

/** Fetches a proof or reads a saved one, and checks it in this browser. `token` is that of the link, or null. */
export function useProofCheck(token: string | null) {
  const state = ref<PageState>(token === null ? 'idle' : 'loading');
  const progress = ref<{ step: 'chain' | 'rules'; share: number }>({ step: 'chain', share: 0 });
  const failure = ref<PageFailure | null>(null);
  const check = shallowRef<ProofCheck | null>(null);
  const work = shallowRef<Work | null>(null);
  let turn = 0;

  const fail = (found: PageFailure): void => {
    [failure.value, state.value] = [found, 'error'];
  };

  async function run(finding: Promise<Found<Work>>): Promise<void> {
    const mine = (turn += 1);
    [failure.value, state.value] = [null, 'loading'];
    const found = await finding;
    if (mine !== turn) return;
    if (!found.ok) return fail(found.problem);
    [progress.value, state.value] = [{ step: 'chain', share: 0 }, 'checking'];
    const done = await checkHere(found.value, (step, share) => {
      if (mine === turn) progress.value = { step, share };
      return painted();
    });
    if (mine !== turn) return;
    if (!done) return fail({ code: 'secure' });
    [check.value, work.value, state.value] = [done, found.value, 'done'];
  }

  const openLink = (): Promise<void> => (token === null ? Promise.resolve() : run(workOfLink(token)));
  const openFile = (file: File): Promise<void> => run(workOfFile(file));
  const origin = computed(() => work.value?.origin ?? null);
  const problems = computed(() => (check.value && origin.value ? problemsOf(check.value, origin.value, token) : []));
  return { state, progress, failure, check, work, origin, problems, openLink, openFile };
}
