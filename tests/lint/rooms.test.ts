import { describe, expect, it } from 'vitest';
import { floors, refusal } from '../../eslint.config.js';

const refused = (file: string, source: string, typesOnly = false) => refusal(file, source, typesOnly);

describe('the floors of shared/', () => {
  it('lets a room see lower floors', () => {
    expect(refused('shared/walk/decide.ts', '../judge/verdict')).toBeNull();
    expect(refused('shared/walk/decide.ts', '@shared/kernel/result')).toBeNull();
  });

  it('refuses a higher floor and the room beside, and says why', () => {
    expect(refused('shared/judge/verdict.ts', '../walk/events')).toContain('floor 3');
    expect(refused('shared/quantity/torque.ts', '@shared/geometry/layout')).toContain('lower floors only');
  });

  it('puts every room on one floor only', () => {
    const rooms = floors.flat();
    expect(new Set(rooms).size).toBe(rooms.length);
  });

  it('allows zod in schemas and contracts, not on the path of a walk', () => {
    expect(refused('shared/contracts/jobs.contract.ts', 'zod')).toBeNull();
    expect(refused('shared/procedure/procedureSchema.ts', 'zod')).toBeNull();
    expect(refused('shared/procedure/lifecycle.ts', 'zod')).toContain('(zod)');
    expect(refused('shared/walk/events.ts', 'zod')).toContain('(zod)');
  });

  it('knows nothing of node:, vue or express', () => {
    for (const source of ['node:crypto', 'vue', 'express', 'drizzle-orm']) {
      expect(refused('shared/record/chain.ts', source)).not.toBeNull();
    }
  });
});

describe('who may import whom', () => {
  it.each([
    ['server/modules/walks/walks.routes.ts', './walks.usecases'],
    ['server/modules/walks/walks.routes.ts', 'express'],
    ['server/modules/walks/walks.usecases.ts', './walks.repository'],
    ['server/modules/walks/walks.repository.ts', '@db/schema/walks'],
    ['src/pages/WalkPage.vue', '@/composables/useWalk'],
    ['src/composables/useWalk.ts', '@/offline/walkStore'],
    ['src/queries/jobs.ts', '@/api/client'],
    ['src/verifier/main.ts', '@shared/proof/verify'],
    ['db/seed/main.ts', '@shared/walk/decide'],
    ['e2e/walk.e2e.ts', '../tests/support/serverProcess'],
    ['shared/walk/decide.test.ts', 'vitest'],
  ])('%s may import %s', (file, source) => {
    expect(refused(file, source)).toBeNull();
  });

  it.each([
    ['server/modules/walks/walks.routes.ts', './walks.repository'],
    ['server/modules/walks/walks.usecases.ts', '@db/schema/walks'],
    ['server/modules/walks/walks.usecases.ts', 'express'],
    ['server/modules/walks/walks.repository.ts', './walks.usecases'],
    ['server/app.ts', '../src/api/client'],
    ['src/api/client.ts', '../../server/app'],
    ['src/pages/WalkPage.vue', '@/offline/walkStore'],
    ['src/components/walk/WalkMap.vue', '@/api/client'],
    ['src/components/base/BaseButton.vue', '@/stores/session'],
    ['src/composables/useWalk.ts', '@/components/walk/WalkMap.vue'],
    ['src/offline/outbox.ts', 'vue'],
    ['src/verifier/main.ts', '@/offline/walkStore'],
    ['src/sw/sw.ts', '@/router/routes'],
    ['db/schema/walks.ts', '../../server/app'],
    ['e2e/walk.e2e.ts', '../src/main'],
    ['src/stores/session.ts', 'node:fs'],
  ])('%s may not import %s', (file, source) => {
    expect(refused(file, source)).not.toBeNull();
  });

  it('lets the building blocks see types of shared, never its code', () => {
    expect(refused('src/components/base/BaseVerdict.vue', '@shared/judge/verdict', true)).toBeNull();
    expect(refused('src/components/base/BaseVerdict.vue', '@shared/judge/verdict')).toContain('building blocks');
  });

  it('has no place for a file in a room nobody named', () => {
    expect(refused('helpers/things.ts', 'vue')).toContain('stands in no room');
  });
});
