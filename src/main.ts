import './boot/looks';
import { createPinia } from 'pinia';
import { createApp } from 'vue';
import App from './App.vue';
import { officeParts } from './boot/officeParts';
import { startWords } from './boot/words';
import { programUpdate } from './composables/programUpdate';
import { startTablet } from './composables/tabletRuntime';
import { createPages } from './router';

const app = createApp(App);
app.use(createPinia());
const office = officeParts(app);
const started = startTablet(String(import.meta.env.VITE_VERSION));

void startWords(office.setLocale).then((words) => {
  app.use(words);
  app.use(createPages({ started, openOffice: office.open }));
  app.mount('#app');
});

if ('serviceWorker' in navigator && import.meta.env.PROD) {
  // Without a worker the program still works, only not without a network: nothing to tell anybody.
  programUpdate
    .watch({ workers: navigator.serviceWorker, reload: () => window.location.reload() })
    .catch(() => undefined);
}
