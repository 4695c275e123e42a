import { fileURLToPath } from 'node:url';

/** Folder of the built web application, seen from the sources and from the built server alike. */
export const webFolder = fileURLToPath(
  new URL(import.meta.url.endsWith('.ts') ? '../dist/spa' : '../spa', import.meta.url),
);
