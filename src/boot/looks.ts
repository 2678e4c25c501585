import 'quasar/src/css/index.sass';
import '@/css/app.css';
import '@/css/quasar.css';

/*
 * All styles in their one order, for every page: Quasar's first, ours over them. Its program comes later, with the office.
 */
