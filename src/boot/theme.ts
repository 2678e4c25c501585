/** The two themes, and "as the system has it". */
export type ThemeWish = 'system' | 'light' | 'dim';

/**
 * Puts the theme on the page and, for `system`, follows the system's changes. Returns how to stop following. The
 * caller keeps the wish.
 */
export function applyTheme(wish: ThemeWish, page: Document = document): () => void {
  const media = page.defaultView?.matchMedia('(prefers-color-scheme: dark)');
  const paint = (): void => {
    page.documentElement.dataset.theme = wish === 'dim' || (wish === 'system' && media?.matches) ? 'dim' : 'light';
  };
  paint();
  if (wish !== 'system' || !media) return () => undefined;
  media.addEventListener('change', paint);
  return () => media.removeEventListener('change', paint);
}
