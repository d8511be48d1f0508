import type { Circuit } from '../../../engine/circuit.ts';

export type PictureTheme = 'paper' | 'dim';

export interface Palette {
  readonly sheet: string;
  readonly rule: string;
  readonly line: string;
  readonly ink: string;
  readonly soft: string;
  readonly accent: string;
  readonly roles: Readonly<Record<Role, string>>;
}

type Role =
  | 'crank'
  | 'cam'
  | 'coil-volts'
  | 'coil-amperes'
  | 'command'
  | 'injector'
  | 'starter'
  | 'supply'
  | 'other';

/** The same tokens as src/styles/theme.css. */
export const PALETTES: Readonly<Record<PictureTheme, Palette>> = {
  paper: {
    sheet: '#fcfbf8',
    rule: '#dad4c6',
    line: '#857e6e',
    ink: '#20262b',
    soft: '#59616a',
    accent: '#6b2d5c',
    roles: {
      crank: '#0b6b6b',
      cam: '#7a3e8e',
      'coil-volts': '#a8442a',
      'coil-amperes': '#8a6000',
      command: '#35558f',
      injector: '#456f25',
      starter: '#74502f',
      supply: '#4a5057',
      other: '#5b636a',
    },
  },
  dim: {
    sheet: '#1e2225',
    rule: '#343a3e',
    line: '#767d82',
    ink: '#e9e5dc',
    soft: '#a4a9ac',
    accent: '#c98dbb',
    roles: {
      crank: '#5bb8b4',
      cam: '#c598da',
      'coil-volts': '#e8906f',
      'coil-amperes': '#d6a847',
      command: '#8fb0e8',
      injector: '#96c46f',
      starter: '#cfa27a',
      supply: '#aeb5bb',
      other: '#9da6ad',
    },
  },
};

const ROLE_OF: Readonly<Record<Circuit, Role>> = {
  'crank-vr': 'crank',
  'crank-hall': 'crank',
  'cam-vr': 'cam',
  'cam-hall': 'cam',
  'coil-primary-voltage': 'coil-volts',
  'coil-primary-current': 'coil-amperes',
  'coil-command': 'command',
  'injector-voltage': 'injector',
  'injector-current': 'injector',
  'starter-current': 'starter',
  'supply-voltage': 'supply',
  'fuel-pump-current': 'other',
  other: 'other',
};

const DASHES: Partial<Record<Role, string>> = { supply: '6 3', other: '2 3' };

/** Colour and dash of a circuit's line; supply and other are dashed, as everywhere. */
export function strokeOf(
  circuit: Circuit,
  theme: PictureTheme,
): { colour: string; dash: string | undefined } {
  const role = ROLE_OF[circuit];
  return { colour: PALETTES[theme].roles[role], dash: DASHES[role] };
}
