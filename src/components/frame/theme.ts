export type Theme = 'paper' | 'dim';

const YEAR_S = 365 * 24 * 3600;

/** What is on the screen now, whoever decided it. */
export const shownTheme = (): Theme =>
  document.documentElement.dataset.theme === 'dim' ||
  (document.documentElement.dataset.theme === undefined && matchMedia('(prefers-color-scheme: dark)').matches)
    ? 'dim'
    : 'paper';

/** Shows a theme and keeps it in the cookie that the server reads; null gives the choice back to the system. */
export function applyTheme(theme: Theme | null): void {
  const secure = location.protocol === 'https:' ? '; Secure' : '';
  const life = theme === null ? 0 : YEAR_S;
  // biome-ignore lint/suspicious/noDocumentCookie: the Cookie Store API is not in every browser yet
  document.cookie = `theme=${theme ?? ''}; Path=/; Max-Age=${life}; SameSite=Lax${secure}`;
  if (theme === null) delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  // Canvases are drawn in the theme's colours: they listen and draw again.
  document.dispatchEvent(new CustomEvent('gapmark:theme'));
}
