import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { PALETTES } from './palette.ts';

const css = readFileSync(new URL('../../../styles/theme.css', import.meta.url), 'utf8');
/** Values of a token in the order in which the style sheet gives them: paper first, then dim. */
const values = (token: string) =>
  [...css.matchAll(new RegExp(`--color-${token}: (#[0-9a-f]{6});`, 'g'))].map(([, value]) => value);

describe('PALETTES', () => {
  it('are the tokens of the pages, in both themes', () => {
    for (const [place, theme] of (['paper', 'dim'] as const).entries()) {
      const { roles, ...tokens } = PALETTES[theme];
      for (const [token, colour] of Object.entries({ ...tokens, ...roles })) {
        expect([theme, token, values(token)[place]]).toEqual([theme, token, colour]);
      }
    }
  });
});
