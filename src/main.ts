import { createPinia } from 'pinia';
import { createApp } from 'vue';
import App from './App.vue';
import { installQuasar } from './boot/quasar';
import { programUpdate } from './composables/programUpdate';
import { startTablet } from './composables/tabletRuntime';
import { useStandSettings } from './composables/useStandSettings';
import { createWords } from './i18n';
import { createPages } from './router';

const app = createApp(App);
app.use(createPinia());
const { locale } = useStandSettings();
app.use(createWords(locale));
installQuasar(app, locale);
app.use(createPages(startTablet(String(import.meta.env.VITE_VERSION))));
app.mount('#app');

if ('serviceWorker' in navigator && import.meta.env.PROD) {
  // Without a worker the program still works, only not without a network: nothing to tell anybody.
  programUpdate
    .watch({ workers: navigator.serviceWorker, reload: () => window.location.reload() })
    .catch(() => undefined);
}
