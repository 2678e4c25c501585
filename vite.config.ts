import { fileURLToPath } from 'node:url';
import { quasar } from '@quasar/vite-plugin';
import vue from '@vitejs/plugin-vue';
import { VitePWA } from 'vite-plugin-pwa';
import { configDefaults, defineConfig } from 'vitest/config';

const root = (path: string) => fileURLToPath(new URL(path, import.meta.url));

const alias = [
  { find: /^@shared\//, replacement: root('./shared/') },
  { find: /^@db\//, replacement: root('./db/') },
  { find: /^@\//, replacement: root('./src/') },
];

const vuePlugins = () => [vue(), quasar({ sassVariables: root('./src/css/quasar.variables.scss') })];

/** A tablet that reloads by itself could do so under somebody's hands: a new version waits until it is asked for. */
const pwa = VitePWA({
  strategies: 'injectManifest',
  registerType: 'prompt',
  injectRegister: false,
  srcDir: 'src/sw',
  filename: 'sw.ts',
  manifest: {
    name: 'Boltwalk',
    short_name: 'Boltwalk',
    description: 'Walks every bolt of a joint and keeps the proof.',
    start_url: '/',
    display: 'standalone',
    orientation: 'any',
    theme_color: '#0b5f6b',
    background_color: '#eef0ed',
    icons: [
      { src: '/icon.svg', sizes: 'any', type: 'image/svg+xml', purpose: 'any' },
      { src: '/icon-192.png', sizes: '192x192', type: 'image/png', purpose: 'any' },
      { src: '/icon-512.png', sizes: '512x512', type: 'image/png', purpose: 'any' },
      { src: '/icon-maskable-512.png', sizes: '512x512', type: 'image/png', purpose: 'maskable' },
    ],
  },
  includeManifestIcons: false,
  injectManifest: {
    globPatterns: ['**/*.{js,css,html,svg,woff2,wasm}'],
    globIgnores: ['verify.html', 'assets/verify-*'],
    maximumFileSizeToCacheInBytes: 4 * 1024 * 1024,
  },
});

const nodeProject = (name: string, include: string[], more: object = {}) => ({
  resolve: { alias },
  test: { name, environment: 'node', testTimeout: 30_000, include, exclude: [...configDefaults.exclude], ...more },
});

/** Tests on a real database: one migrated template, a clone for each file. */
const database = {
  globalSetup: [root('./tests/support/globalDatabase.ts')],
  testTimeout: 30_000,
  hookTimeout: 60_000,
};

export default defineConfig({
  plugins: [...vuePlugins(), pwa],
  resolve: { alias },
  define: {
    'import.meta.env.VITE_VERSION': JSON.stringify(process.env.npm_package_version ?? 'development'),
    // What nobody here uses stays out of what a tablet loads.
    __VUE_OPTIONS_API__: false,
    __VUE_I18N_LEGACY_API__: false,
    __INTLIFY_PROD_DEVTOOLS__: false,
  },
  build: {
    target: 'es2022',
    rolldownOptions: { input: { app: root('./index.html'), verify: root('./verify.html') } },
  },
  server: { proxy: { '/api': 'http://127.0.0.1:4180' } },
  test: {
    coverage: {
      provider: 'v8',
      include: ['shared/**/*.ts', 'server/**/*.ts', 'db/**/*.ts', 'src/**/*.{ts,vue}'],
      exclude: ['**/*.test.ts', 'db/seed/**', 'db/migrations/**'],
      reporter: ['text-summary', 'html'],
      reportsDirectory: 'coverage',
    },
    projects: [
      nodeProject('unit', ['{shared,server,db}/**/*.test.ts', 'tests/lint/**/*.test.ts']),
      {
        plugins: vuePlugins(),
        resolve: { alias },
        test: { name: 'component', environment: 'happy-dom', testTimeout: 30_000, include: ['src/**/*.test.ts'] },
      },
      nodeProject('handbook', ['tests/handbook/**/*.test.ts'], { testTimeout: 30_000 }),
      nodeProject('integration', ['tests/{integration,migrations}/**/*.test.ts'], database),
      nodeProject('sync', ['tests/sync/**/*.test.ts'], database),
      nodeProject('drill', ['tests/drill/**/*.test.ts'], { ...database, testTimeout: 600_000 }),
    ],
  },
});
