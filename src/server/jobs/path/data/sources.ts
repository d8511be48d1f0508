import type { Source } from '../types.ts';

export const practice: Source = { kind: 'practice', text: 'common practice, no source' };
export const memory: Source = { kind: 'memory', text: 'from memory, not looked up' };
export const maker: Source = { kind: 'maker', text: "the maker's service information decides" };
export const arithmetic: Source = { kind: 'arithmetic', text: 'arithmetic' };
export const chosen: Source = { kind: 'practice', text: 'a limit chosen for this program, no source' };
