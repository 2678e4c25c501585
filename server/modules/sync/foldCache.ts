import type { WalkState } from '@shared/walk/state';

/**
 * Folded states by shop and hash of the head: a hash stands for the whole chain before it, so a state kept under it is
 * right for ever and needs no forgetting but for room. States are never changed, only copied.
 */
export class FoldCache {
  private readonly kept = new Map<string, WalkState>();

  constructor(private readonly most = 300) {}

  /** The state after the event of that hash, if it is kept. */
  get(shop: string, hash: string): WalkState | undefined {
    const key = `${shop} ${hash}`;
    const state = this.kept.get(key);
    if (state) {
      this.kept.delete(key);
      this.kept.set(key, state);
    }
    return state;
  }

  /** Keeps a state; the longest unused one goes when there is no room. */
  set(shop: string, hash: string, state: WalkState): void {
    const oldest = this.kept.size >= this.most ? this.kept.keys().next() : null;
    if (oldest && !oldest.done) this.kept.delete(oldest.value);
    this.kept.set(`${shop} ${hash}`, state);
  }
}
