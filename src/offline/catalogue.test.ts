// @vitest-environment node
import { describe, expect, it } from 'vitest';
import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Confirmation } from '@shared/contracts/confirmation.contract';
import { applyCatalogue, emptyCatalogue, keepConfirmations, mergeCatalogue } from './catalogue';
import { tabletSettings } from './settings';
import { failingIndexedDb } from './testing/failingIndexedDb';
import { handClock, PERSON, WALK } from './testing/tabletKit';

const person = (name: string) => ({
  ...{ id: PERSON, name, roles: ['technician' as const], state: 'active' as const, pinVersion: 1 },
});
const answer = (more: Partial<CatalogueAnswer> = {}): CatalogueAnswer => ({
  ...{ cursor: 3, epoch: 'e1', full: false, now: '2026-06-13T08:00:10.000Z', settings: null, people: [], wrenches: [] },
  ...{ procedures: [], jobs: [], joints: [], walks: [], orders: [], confirmations: [] },
  ...more,
});
const confirmation = (at: string, result: Confirmation['result'], jws = at): Confirmation => ({
  ...{ walk: WALK, branch: 0, seq: 4, hash: 'a'.repeat(64), person: PERSON, meaning: 'checkedRecord', reason: null },
  ...{ at, result, jws },
});

describe('the catalogue', () => {
  it('takes changed rows and keeps the others', () => {
    const first = mergeCatalogue(emptyCatalogue(), answer({ people: [person('Ann')] }));
    const second = mergeCatalogue(first, answer({ cursor: 4, people: [person('Anne')] }));
    const third = mergeCatalogue(second, answer({ cursor: 5 }));
    expect(third).toMatchObject({ cursor: 5, people: { [PERSON]: { name: 'Anne' } } });
  });

  it('forgets what was kept when a whole one comes (another epoch)', () => {
    const first = mergeCatalogue(emptyCatalogue(), answer({ people: [person('Ann')] }));
    expect(mergeCatalogue(first, answer({ epoch: 'e2', full: true })).people).toEqual({});
  });

  it('is not set back by an answer that was overtaken', async () => {
    const settings = tabletSettings({ factory: failingIndexedDb().factory });
    const clock = handClock();
    await applyCatalogue(settings, clock, answer({ cursor: 9, people: [person('Ann')] }));
    await applyCatalogue(settings, clock, answer({ cursor: 8, people: [person('Old')] }));
    expect(await settings.get('catalogue')).toMatchObject({ cursor: 9, people: { [PERSON]: { name: 'Ann' } } });
  });

  it('writes down when the server was heard and how its clock differs', async () => {
    const settings = tabletSettings({ factory: failingIndexedDb().factory });
    const clock = handClock();
    await applyCatalogue(settings, clock, answer());
    expect(await settings.get('clock')).toEqual({
      lastContact: clock.now(),
      latestSeen: clock.now(),
      serverOffset: 10_000,
    });
  });

  it('keeps each confirmation once, the later one last: a PIN disowned later counts (P3)', async () => {
    const settings = tabletSettings({ factory: failingIndexedDb().factory });
    await keepConfirmations(settings, [confirmation('2026-06-14T00:00:00.000Z', 'refused')]);
    await keepConfirmations(settings, [confirmation('2026-06-13T00:00:00.000Z', 'accepted')]);
    await keepConfirmations(settings, [confirmation('2026-06-13T00:00:00.000Z', 'accepted')]);
    const kept = (await settings.get('catalogue'))?.confirmations[WALK];
    expect(kept?.map(({ result }) => result)).toEqual(['accepted', 'refused']);
  });
});
