import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. */
export const root = fileURLToPath(new URL('../..', import.meta.url));

/** Absolute path of something in the checkout. */
export const inRoot = (/** @type {string[]} */ ...parts) => join(root, ...parts);
