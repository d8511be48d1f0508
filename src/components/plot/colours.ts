/** Colours for canvases come from the same variables as everything else. */
export const cssColour = (name: string): string =>
  getComputedStyle(document.documentElement).getPropertyValue(`--color-${name}`).trim() || '#000';

/** Calls back when the theme was switched here or by the system. Returns how to stop. */
export function onThemeChange(listener: () => void): () => void {
  const system = matchMedia('(prefers-color-scheme: dark)');
  document.addEventListener('gapmark:theme', listener);
  system.addEventListener('change', listener);
  return () => {
    document.removeEventListener('gapmark:theme', listener);
    system.removeEventListener('change', listener);
  };
}
