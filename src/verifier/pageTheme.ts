import { ref } from 'vue';

/** The theme the page stands in. */
export type PageTheme = 'light' | 'dim';

/** Follows the system until the reader chooses; the choice lasts as long as the page. */
export const theme = ref<PageTheme>('light');
let chosen = false;

function paint(wish: PageTheme): void {
  theme.value = wish;
  document.documentElement.dataset.theme = wish;
}

/** Puts the system's theme on the page and follows it. */
export function applyTheme(): void {
  const media = window.matchMedia('(prefers-color-scheme: dark)');
  const follow = (): void => {
    if (!chosen) paint(media.matches ? 'dim' : 'light');
  };
  media.addEventListener('change', follow);
  follow();
}

/** The reader's own choice. */
export function chooseTheme(wish: PageTheme): void {
  chosen = true;
  paint(wish);
}
