import { expect, it } from 'vitest';
import { canonicalJson } from '@shared/record/canonicalJson';
import { hashText } from '@shared/record/chain';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { webRecordCrypto } from '@/offline/webCrypto';
import { stretchHead } from '../../support/smallProcedures';
import { FakeShop, JOINT, PINS, TECH } from './fakeShop';
import { realTablet, wideWrench } from './realTablet';

/** The same joint, its first torque 10 N·m higher, as revision 2. */
const stiffer = ({ passes, ...document }: ProcedureDocument): ProcedureDocument => {
  const window = { target: '40', low: '38', high: '42', unit: 'N.m' } as const;
  const stages = [{ id: 's1', kind: 'torque', windows: { A: window, B: window } }] as const;
  return { ...document, passes: passes.map((pass) => (pass.id === 'p1' ? { ...pass, stages: [...stages] } : pass)) };
};

it('walks on by the revision it began with when another one arrives, also after a restart (fault 22)', async () => {
  const shop = await FakeShop.open(stretchHead(), [wideWrench]);
  const real = await realTablet(shop);
  expect((await real.tablet.enrol(shop.code, 'Stand 1')).ok).toBe(true);
  expect((await real.tablet.signIn(TECH, PINS[TECH] ?? '')).ok).toBe(true);
  const wanted = { joint: JOINT, purpose: 'finalAssembly', pulls: TECH, records: TECH } as const;
  const begun = await real.tablet.walks.begin(wanted, TECH);
  if (!begun.ok) throw new Error(JSON.stringify(begun.error));
  const log = await real.tablet.walks.open(begun.value);
  const before = log.snapshot();

  const [old] = shop.answer.procedures;
  if (!old) throw new Error('the shop has no procedure');
  const document = stiffer(old.document);
  const hash = await hashText(canonicalJson(document), webRecordCrypto());
  shop.answer = {
    ...shop.answer,
    cursor: shop.answer.cursor + 1,
    full: false,
    procedures: [
      { ...old, state: 'superseded' },
      { ...old, revision: 2, hash, document },
    ],
  };
  await real.tablet.sync.press();
  expect(Object.keys(real.tablet.catalogue.procedures).sort()).toEqual([old.hash, hash].sort());
  expect(log.snapshot()).toMatchObject({ head: before.head, view: before.view });

  const again = await realTablet(shop, real);
  const reopened = (await again.tablet.walks.open(begun.value)).snapshot();
  expect(reopened.head).toBe(before.head);
  expect(reopened.state.procedureHash).toBe(old.hash);
  expect(reopened.state.procedure).toEqual(old.document);

  const next = await again.tablet.walks.begin(wanted, TECH);
  if (!next.ok) throw new Error(JSON.stringify(next.error));
  const fresh = (await again.tablet.walks.open(next.value)).snapshot();
  expect(fresh.state.procedureHash).toBe(hash);
});
