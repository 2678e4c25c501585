import { createApp } from 'vue';
import { applyTheme } from './pageTheme';
import { startLanguage } from './pageLanguage';
import App from './App.vue';
import './verifier.css';

/** The token in `/p/<token>`, or null on the bare page. */
const tokenOf = (path: string): string | null => {
  const found = /^\/p\/([^/]+)\/?$/.exec(path)?.[1];
  return found === undefined ? null : decodeURIComponent(found);
};

applyTheme();
startLanguage();
createApp(App, { token: tokenOf(window.location.pathname) }).mount('#verifier');
