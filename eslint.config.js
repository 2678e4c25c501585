import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import { defineConfig } from 'eslint/config';
import globals from 'globals';
import tseslint from 'typescript-eslint';

const root = import.meta.dirname;

/**
 * @typedef {object} Room
 * @property {string} in the folder or file it rules
 * @property {string} [ends] the end of the names it rules
 * @property {string[]} may folders and files it may import; 'type:' in front means types only
 * @property {string[]} [mayNot] exceptions to these: folders, or parts of names such as '.routes'
 * @property {string[]} [packages] the packages allowed; absent: any
 * @property {string[]} [never] packages refused
 * @property {string} why what the message says
 */

/** The floors of shared/: a room sees lower floors only, and nothing of the rooms beside it. */
export const floors = [
  ['kernel'],
  ['quantity', 'statistics', 'geometry', 'record', 'people', 'vehicle'],
  ['fastener', 'sequence', 'curve', 'calibration'],
  ['procedure', 'judge'],
  ['crib'],
  ['walk', 'deskCheck'],
  ['proof', 'lookBack', 'trends'],
  ['contracts'],
];

/** @type {Room[]} */
const floorRooms = floors.flatMap((rooms, floor) =>
  rooms.map((name) => ({
    in: `shared/${name}`,
    may: floors.slice(0, floor).flatMap((lower) => lower.map((below) => `shared/${below}`)),
    packages: name === 'contracts' ? ['zod'] : [],
    why: `shared/${name} stands on floor ${floor}: it is pure and imports lower floors only`,
  })),
);

const screen = ['vue', 'vue-router', 'vue-i18n', 'pinia', 'quasar', '@quasar/extras', '@tanstack/vue-query'];
const words = ['src/i18n', 'src/css'];

/**
 * Who may import whom. The first row that fits a file rules it; a file always sees its own folder.
 * @type {Room[]}
 */
export const rooms = [
  {
    in: 'shared/procedure',
    ends: 'Schema.ts',
    may: [
      'shared/kernel',
      'shared/quantity',
      'shared/statistics',
      'shared/geometry',
      'shared/record',
      'shared/people',
    ].concat(['shared/vehicle', 'shared/fastener', 'shared/sequence', 'shared/curve', 'shared/calibration']),
    packages: ['zod'],
    why: 'a schema of shared/procedure is pure and imports lower floors and zod only',
  },
  ...floorRooms,

  {
    in: 'db/seed',
    may: ['shared', 'db'],
    never: ['vue', 'quasar', 'pinia', 'express'],
    why: 'the seed decides and signs its chains with shared; it knows neither server nor screens',
  },
  { in: 'db', may: ['type:shared'], never: screen.concat('express'), why: 'db knows tables and the types of shared' },

  {
    in: 'server/modules',
    ends: '.routes.ts',
    may: ['shared', 'server'],
    mayNot: ['.repository'],
    never: ['drizzle-orm', 'pg'],
    why: 'routes ask use cases, never a repository or a table',
  },
  {
    in: 'server/modules',
    ends: '.repository.ts',
    may: ['shared', 'db', 'server'],
    mayNot: ['.routes', '.usecases', 'server/http', 'server/app', 'server/main'],
    never: ['express'],
    why: 'a repository holds queries: it calls neither routes nor use cases and sees no request',
  },
  {
    in: 'server/modules',
    may: ['shared', 'server'],
    mayNot: ['.routes', 'server/app', 'server/main'],
    never: ['express', 'drizzle-orm', 'pg'],
    why: 'below the routes no request and no SQL: only repositories import tables',
  },
  { in: 'server/http', may: ['shared', 'server'], why: 'the request wrapper serves every module and reads no table' },
  { in: 'server', may: ['shared', 'server', 'db/cluster.mjs'], why: 'only repositories import tables' },

  ...['offline', 'wrench-link', 'sound'].map((name) => ({
    in: `src/${name}`,
    may: ['shared', 'src/api'],
    never: screen,
    why: `src/${name} works without any screen: shared and api only`,
  })),
  ...['base', 'form'].map((name) => ({
    in: `src/components/${name}`,
    may: ['type:shared', 'src/components/base', 'src/components/form', ...words],
    never: ['pinia', 'vue-router', '@tanstack/vue-query'],
    why: `components/${name} are building blocks: vue, quasar and types of shared; no store, query, offline or router`,
  })),
  ...['components', 'pages', 'layouts'].map((name) => ({
    in: `src/${name}`,
    may: ['shared', 'src/composables', 'src/queries', 'src/stores', 'src/components', 'src/layouts', ...words],
    why: `src/${name} ask composables, queries and stores; api and offline are never touched directly`,
  })),
  {
    in: 'src/composables',
    may: ['shared', 'src/offline', 'src/wrench-link', 'src/sound', 'src/stores', 'src/queries', ...words],
    why: 'a composable stands between what works and what shows: no components, no pages',
  },
  { in: 'src/queries', may: ['shared', 'src/api'], why: 'queries read the server through api: no screens, no offline' },
  { in: 'src/stores', may: ['shared'], never: ['quasar', 'vue-router', 'vue-i18n'], why: 'stores hold session state' },
  { in: 'src/api', may: ['shared'], never: screen, why: 'api speaks contracts of shared and knows no screen' },
  { in: 'src/sw', may: ['shared'], never: screen, why: 'the service worker stands alone with shared' },
  {
    in: 'src/verifier',
    may: ['shared', ...words],
    never: ['pinia', 'vue-router', '@tanstack/vue-query'],
    why: 'whoever checks a proof needs nothing of the application: shared, words and looks only',
  },
  { in: 'src/i18n', may: ['type:shared'], packages: ['vue-i18n'], why: 'words hold no behaviour' },
  {
    in: 'src',
    may: ['shared', 'src'],
    mayNot: ['src/sw', 'src/verifier'],
    why: 'screens and server meet in shared only',
  },

  {
    in: 'e2e',
    may: ['shared', 'tests/support'],
    why: 'end-to-end tests see what a person sees: neither src nor server',
  },
  {
    in: 'tests',
    may: ['shared', 'db', 'server', 'src', 'tests', 'e2e/support', 'eslint.config.js'],
    why: 'tests see all',
  },
  { in: 'vite.config.ts', may: [], why: 'tool configuration imports no source' },
  { in: 'drizzle.config.ts', may: [], why: 'tool configuration imports no source' },
];

/** @type {Record<string, string>} */
const aliases = { '@shared/': 'shared/', '@db/': 'db/', '@/': 'src/' };

/** The project's file an import means, or null for a package. @param {string} from @param {string} source */
const projectPath = (from, source) => {
  if (source.startsWith('.')) return path.posix.normalize(path.posix.join(path.posix.dirname(from), source));
  const alias = Object.keys(aliases).find((prefix) => source.startsWith(prefix));
  return alias ? `${aliases[alias]}${source.slice(alias.length)}` : null;
};

/** @param {string} file @param {string} place */
const isUnder = (file, place) => file === place || file.startsWith(`${place}/`) || file.startsWith(`${place}.`);
/** @param {string} source */
const packageOf = (source) =>
  source
    .split('/')
    .slice(0, source.startsWith('@') ? 2 : 1)
    .join('/');

/** @param {string} file @param {boolean} isTest */
const noNode = (file, isTest) =>
  !isTest && /^(shared|src)\//.test(file) ? 'shared/ and src/ run in a browser: nothing of `node:` is there' : null;

/**
 * Why this file may not import that, or null. Tests see what stands beside them and every tool of testing.
 * @param {string} file @param {string} source @param {boolean} [typesOnly]
 */
export const refusal = (file, source, typesOnly = false) => {
  const isTest = /\.test\.ts$/.test(file);
  const room = rooms.find((row) => isUnder(file, row.in) && (!row.ends || file.endsWith(row.ends)));
  if (!room) return `${file} stands in no room: put it where the table of rooms in eslint.config.js has a place for it`;
  const target = projectPath(file, source);
  if (target === null) {
    if (source.startsWith('node:')) return noNode(file, isTest);
    const name = packageOf(source);
    const refused = !isTest && ((room.packages && !room.packages.includes(name)) || room.never?.includes(name));
    return refused && !(typesOnly && room.in === 'server/modules' && name !== 'express')
      ? `${room.why} (${name})`
      : null;
  }
  const forbidden = room.mayNot?.some((part) => (part.startsWith('.') ? target.includes(part) : isUnder(target, part)));
  if (forbidden) return `${room.why} (${target})`;
  if (isUnder(target, room.in) || (isTest && isUnder(target, 'tests/support'))) return null;
  const allowed = room.may.some((place) =>
    place.startsWith('type:') ? (typesOnly || isTest) && isUnder(target, place.slice(5)) : isUnder(target, place),
  );
  return allowed ? null : `${room.why} (${target})`;
};

/** @type {import('eslint').Rule.RuleModule} */
const roomRule = {
  meta: { type: 'problem', schema: [], messages: { room: '{{ reason }}' } },
  create(context) {
    const file = path.relative(root, context.filename).split(path.sep).join('/');
    /** @param {any} node @param {boolean} typesOnly */
    const check = (node, typesOnly) => {
      if (typeof node.source?.value !== 'string') return;
      const reason = refusal(file, node.source.value, typesOnly);
      if (reason) context.report({ node, messageId: 'room', data: { reason } });
    };
    /** @param {any} node */
    const isType = (node) =>
      node.importKind === 'type' ||
      node.exportKind === 'type' ||
      (node.specifiers?.length > 0 && node.specifiers.every((/** @type {any} */ one) => one.importKind === 'type'));
    return {
      ImportDeclaration: (node) => check(node, isType(node)),
      ExportNamedDeclaration: (node) => check(node, isType(node)),
      ExportAllDeclaration: (node) => check(node, isType(node)),
      ImportExpression: (node) => check(node, false),
    };
  },
};

const pureGlobals = [
  'crypto',
  'performance',
  'setTimeout',
  'setInterval',
  'queueMicrotask',
  'fetch',
  'window',
  'document',
];
const notFromOutside = 'shared/ is pure: time, ids, keys, randomness and hashing come in as arguments';

/** @type {import('eslint').Linter.RulesRecord} */
const pure = {
  'no-restricted-globals': ['error', ...pureGlobals.map((name) => ({ name, message: notFromOutside }))],
  'no-restricted-properties': [
    'error',
    { object: 'Date', property: 'now', message: notFromOutside },
    { object: 'Math', property: 'random', message: notFromOutside },
    { object: 'globalThis', property: 'crypto', message: notFromOutside },
  ],
  'no-restricted-syntax': [
    'error',
    { selector: 'NewExpression[callee.name="Date"][arguments.length=0]', message: notFromOutside },
    { selector: 'CallExpression[callee.name="Date"]', message: notFromOutside },
  ],
};

/** The tests of src/ run in Node.js, so its types are in the same program; the pages themselves have none of it. */
const browserOnly = ['process', 'Buffer', 'global', 'require', '__dirname', 'setImmediate'].map((name) => ({
  name,
  message: 'src/ runs in a browser: nothing of Node.js is there',
}));

const lines = { skipBlankLines: true, skipComments: true };

/** The linter's own proof that every folder of shared/ has a floor. */
const strangers = existsSync(path.join(root, 'shared'))
  ? readdirSync(path.join(root, 'shared'), { withFileTypes: true })
      .filter((entry) => entry.isDirectory() && !floors.flat().includes(entry.name))
      .map((entry) => entry.name)
  : [];
if (strangers.length > 0) throw new Error(`shared/${strangers.join(', shared/')}: no floor in eslint.config.js`);

export default defineConfig(
  { ignores: ['dist/**', 'coverage/**', '.local/**', 'node_modules/**', 'test-results/**', 'playwright-report/**'] },
  { linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' } },
  js.configs.recommended,
  tseslint.configs.recommendedTypeChecked,
  vue.configs['flat/recommended'],
  prettier,
  {
    files: ['**/*.{js,mjs,ts,vue}'],
    plugins: { boltwalk: { rules: { rooms: roomRule } } },
    languageOptions: {
      parserOptions: {
        parser: tseslint.parser,
        projectService: { allowDefaultProject: ['eslint.config.js'] },
        tsconfigRootDir: root,
        extraFileExtensions: ['.vue'],
      },
    },
    rules: {
      'no-console': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'max-lines': ['error', { max: 400 }],
      'no-undef': 'off',
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      // Another package's interface is widened by an empty one that extends ours.
      '@typescript-eslint/no-empty-object-type': ['error', { allowInterfaces: 'with-single-extends' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true, allowBoolean: true }],
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      'vue/multi-word-component-names': ['error', { ignores: ['App'] }],
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
      'vue/component-name-in-template-casing': ['error', 'PascalCase'],
      'vue/define-macros-order': 'error',
      'vue/no-v-html': 'error',
    },
  },
  { files: ['**/*.{ts,vue}'], rules: { 'boltwalk/rooms': 'error' } },
  {
    files: ['{shared,server,db,src}/**/*.ts'],
    ignores: ['**/*.test.ts'],
    rules: { 'max-lines-per-function': ['error', { max: 40, ...lines }] },
  },
  { files: ['shared/**/*.ts'], ignores: ['**/*.test.ts'], rules: pure },
  {
    files: ['src/**/*.{ts,vue}'],
    ignores: ['**/*.test.ts'],
    rules: { 'no-restricted-globals': ['error', ...browserOnly] },
  },
  {
    files: ['**/*.test.ts', 'tests/**/*.ts', 'e2e/**/*.ts'],
    rules: { '@typescript-eslint/unbound-method': 'off' },
  },
  // A value stands there as its source prints it, with all its digits.
  { files: ['tests/handbook/**/*.ts'], rules: { 'no-loss-of-precision': 'off' } },
  {
    files: ['**/*.{js,mjs}'],
    extends: [tseslint.configs.disableTypeChecked],
    languageOptions: { globals: globals.node },
    rules: { 'no-undef': 'error' },
  },
);
