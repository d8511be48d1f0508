// @ts-check
import { fileURLToPath } from 'node:url';

/** The folder of this checkout, without a slash at the end. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');
