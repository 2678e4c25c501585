import { fileURLToPath } from 'node:url';
import { quasar } from '@quasar/vite-plugin';
import vue from '@vitejs/plugin-vue';
import { defineConfig } from 'vite';

const root = (path: string) => fileURLToPath(new URL(path, import.meta.url));

/** Shows the parts of the walk on a page of their own: npx vite --config tests/support/gallery/vite.config.ts */
export default defineConfig({
  root: root('./'),
  cacheDir: root('../../../node_modules/.cache/gallery'),
  plugins: [vue(), quasar({ sassVariables: root('../../../src/css/quasar.variables.scss') })],
  resolve: {
    alias: [
      { find: /^@shared\//, replacement: root('../../../shared/') },
      { find: /^@\//, replacement: root('../../../src/') },
    ],
  },
  server: { port: 4391, strictPort: true, fs: { allow: [root('../../../')] } },
});
