import { readonly, shallowRef, type ShallowRef } from 'vue';
import type { AnswerOf } from '@shared/contracts/defineEndpoint';
import type { doors } from '@shared/contracts/demo.contract';
import { tabletRuntime } from './tabletRuntime';

/** The demo's doors, or `null` where there is no demo, or no server. `undefined` until it is known. */
export type DemoDoors = AnswerOf<typeof doors>;

/** Asks once whether this is the demo. Outside it the address does not exist, and no door is shown. */
export function useDemoDoors(): Readonly<ShallowRef<DemoDoors | null | undefined>> {
  const found = shallowRef<DemoDoors | null | undefined>(undefined);
  const { client } = tabletRuntime().world;
  client
    .call<typeof doors>({ method: 'GET', path: '/api/demo/doors' })
    .then((answer) => {
      found.value = answer.kind === 'done' ? answer.value : null;
    })
    // A client never throws; were it to, there is no demo to show.
    .catch(() => (found.value = null));
  return readonly(found) as Readonly<ShallowRef<DemoDoors | null | undefined>>;
}
