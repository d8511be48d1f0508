import { applyTheme, shownTheme } from './theme.ts';

/** Every [data-theme-switch] turns paper into dim and back; hidden without script, when the system's setting decides. */
for (const button of document.querySelectorAll<HTMLButtonElement>('[data-theme-switch]')) {
  button.hidden = false;
  button.addEventListener('click', () => applyTheme(shownTheme() === 'dim' ? 'paper' : 'dim'));
}
