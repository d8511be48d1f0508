import { applyTheme } from '../frame/theme.ts';

/** The three-way switch on the workshop page; hidden without script, when the system's setting decides. */
for (const choice of document.querySelectorAll<HTMLElement>('[data-theme-choice]')) {
  choice.hidden = false;
  const buttons = [...choice.querySelectorAll<HTMLButtonElement>('[data-theme-value]')];
  const show = () => {
    const shown = document.documentElement.dataset.theme ?? 'system';
    for (const button of buttons)
      button.setAttribute('aria-pressed', String(button.dataset.themeValue === shown));
  };
  for (const button of buttons) {
    button.addEventListener('click', () => {
      const { themeValue } = button.dataset;
      applyTheme(themeValue === 'paper' || themeValue === 'dim' ? themeValue : null);
    });
  }
  document.addEventListener('gapmark:theme', show);
}
