import { createApp } from 'vue';
import { installQuasar } from '@/boot/quasar';
import { applyTheme } from '@/boot/theme';
import { createWords, localeOf } from '@/i18n';
import { allMessages } from '@/i18n/allMessages';
import GalleryChoice from './GalleryChoice.vue';
import GalleryFlange from './GalleryFlange.vue';
import GalleryForms from './GalleryForms.vue';
import GalleryHeads from './GalleryHeads.vue';
import GalleryWalk from './GalleryWalk.vue';

/** One screen a name: ?show=walk|choice|heads|flange|forms, ?theme=dim, ?lang=es, ?hand=left, ?turns=1. */
const screens = {
  walk: GalleryWalk,
  choice: GalleryChoice,
  heads: GalleryHeads,
  flange: GalleryFlange,
  forms: GalleryForms,
};
const asked = new URLSearchParams(globalThis.location.search);
const locale = localeOf(asked.get('lang'));
const screen = screens[asked.get('show') ?? 'walk'] ?? GalleryWalk;
applyTheme(asked.get('theme') === 'dim' ? 'dim' : 'light');
const app = createApp(screen, Object.fromEntries(asked));
installQuasar(app, locale);
app.use(createWords(locale, allMessages)).mount('#app');
