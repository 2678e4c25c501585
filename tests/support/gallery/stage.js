import { createApp, h, ref, shallowRef } from 'vue';
import App from './StageApp.vue';
import { installQuasar } from '@/boot/quasar';
import { applyTheme } from '@/boot/theme';
import { useStandSettings } from '@/composables/useStandSettings';
import { createWords, localeOf } from '@/i18n';
import { allMessages } from '@/i18n/allMessages';
import { view } from '@shared/walk/view';
import { demoProcedures } from '../../../db/seed/procedures';
import { brindleWrenches } from '../../../db/seed/wrenches';
import { openBook } from '../../../db/seed/walker/walkBook';
import { walkPlain } from '../../../db/seed/walker/walkOn';
import { flange64 } from '../flange64';

/*
 * The real screens of a walk on a walk that lives in memory: every tap decides and folds by the real rules, nothing is
 * stored. ?proc=HEAD-D6 &to=pull|step|… &pass=p3 &hole=h7 (walks there first) &slip=over,h5 &theme=dim &lang=es &hand=left.
 */
const asked = new URLSearchParams(globalThis.location.search);
const locale = localeOf(asked.get('lang'));
const settings = useStandSettings();
settings.hand = asked.get('hand') === 'left' ? 'left' : 'right';
settings.torqueUnit = asked.get('unit') ?? 'asWritten';
applyTheme(asked.get('theme') === 'dim' ? 'dim' : 'light');

const people = [
  { id: 'ilse', name: 'Ilse Marchetti-Vane', roles: ['technician'], state: 'active', pinVersion: 1 },
  { id: 'tomas', name: 'Tomas Reyes Ondrak', roles: ['technician'], state: 'active', pinVersion: 1 },
  { id: 'greta', name: 'Greta Holm', roles: ['supervisor'], state: 'active', pinVersion: 1 },
];
const roles = Object.fromEntries(people.map(({ id, roles: held }) => [id, held]));
const procedure = [...demoProcedures, flange64].find(({ code }) => code === (asked.get('proc') ?? 'HEAD-D6'));
const wrenches = brindleWrenches(Date.now(), (tag) => tag);

const book = openBook({
  job: 'job',
  joint: 'joint',
  procedure,
  revision: 4,
  hash: '00'.repeat(32),
  tablet: 'tablet',
  boot: 'boot',
  known: 1,
  startMs: Date.now() - 3_600_000,
  people: roles,
  pulls: 'ilse',
  records: asked.get('records') ?? 'ilse',
  supervisor: 'greta',
  wrenches,
  ...(asked.get('purpose') ? { purpose: asked.get('purpose') } : {}),
  ...(asked.get('earlier') ? { earlier: { readingsTaken: true, usedHoles: ['h1', 'h2'] } } : {}),
});

const wanted = {
  kind: asked.get('to') ?? 'pull',
  pass: asked.get('pass'),
  hole: asked.get('hole'),
  mode: asked.get('mode'),
  round: asked.get('round'),
};
const slotOf = (instruction) => ('slot' in instruction ? instruction.slot : null);
const isThere = (instruction) => {
  const slot = slotOf(instruction);
  const hole = slot?.hole ?? instruction.hole ?? instruction.deviation?.hole ?? null;
  const pass = slot?.pass ?? instruction.deviation?.slot?.pass ?? instruction.pass?.id ?? null;
  return (
    instruction.kind === wanted.kind &&
    (!wanted.pass || pass === wanted.pass) &&
    (!wanted.hole || hole === wanted.hole) &&
    (!wanted.mode || instruction.mode === wanted.mode) &&
    (!wanted.round || String(slot?.round) === wanted.round)
  );
};
const slips = (asked.get('slips') ?? '')
  .split(';')
  .filter(Boolean)
  .map((text) => {
    const [pass, hole, kind, value, more] = text.split(',');
    return kind === 'different'
      ? { at: { pass, hole }, kind: 'differentHole', hole: value }
      : { at: { pass, hole }, kind: kind === 'wrong' ? 'typedWrong' : 'value', value, unit: more, reason: 'mistyped' };
  });
const choice = asked.get('choice');
if (wanted.kind !== 'open') {
  walkPlain(book, {
    until: isThere,
    slips,
    source: asked.get('source') ?? 'typed',
    settle: (_deviation, offers) => (choice && offers.offered.includes(choice) ? choice : undefined),
  });
}
if (asked.get('then')) {
  for (const name of asked.get('then').split(',')) {
    if (name === 'pause') book.issue({ type: 'walk.paused', by: 'ilse', data: { cause: 'asked' } });
    if (name === 'away') book.issue({ type: 'walk.paused', by: 'ilse', data: { cause: 'calledAway' } });
    if (name === 'kill') book.reboot('boot2');
    if (name === 'stop') {
      const data = { order: 'o1', why: 'stop', reason: 'The gasket batch is recalled' };
      book.issue({ type: 'walk.stopped', by: 'greta', data });
    }
    if (name === 'void') book.issue({ type: 'walk.voided', by: 'greta', data: { reason: 'Wrong engine' } });
  }
}

const state = shallowRef(book.state);
const now = ref(book.now());
const began = performance.now();
let lastTick = began;
setInterval(() => {
  const tick = performance.now();
  book.pass(tick - lastTick);
  lastTick = tick;
  now.value = book.now();
}, 1000);
const SEAL = 'a5'.repeat(32);
const sealed = ({ type, data }) => {
  if (type === 'wrench.taken' && data.override) return { ...data, override: { ...data.override, seal: SEAL } };
  return { ...data, seal: SEAL };
};
const access = {
  walk: 'stage',
  get state() {
    return state.value;
  },
  get view() {
    return view(state.value, now.value);
  },
  get now() {
    return now.value;
  },
  readOnly: asked.get('readOnly') === '1',
  brokenAt: asked.get('broken') === '1' ? 31 : null,
  person: people.find(({ id }) => id === (asked.get('person') ?? 'ilse')),
  people,
  wrenches: wrenches.map((snapshot) => ({ id: snapshot.id, snapshot, state: snapshot.state })),
  job: { number: '24-0613', engineSerial: 'OD6-118204' },
  act: async (act, more = {}) => {
    const data = more.pin === undefined ? act.data : sealed(act);
    const done = book.attempt({ type: act.type, data, by: more.by?.id ?? access.person.id, after: 0 });
    state.value = book.state;
    now.value = book.now();
    globalThis.events = book.events;
    return done.ok ? null : done.error;
  },
  checkPin: async (_person, pin) => (pin === '111111' ? { code: 'pin.wrong' } : null),
  leave: () => undefined,
};
const tray = { waiting: Number(asked.get('waiting') ?? '31'), refused: 0, open: () => undefined };
const app = createApp({ render: () => h(App, { walk: access, tray }) });
installQuasar(app, locale);
app.use(createWords(locale, allMessages)).mount('#app');
