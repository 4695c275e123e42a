import type { ReplayQueue } from './replay-queue';

/** Works nothing off: what is queued stays for the server that runs on the same database. */
export const idleQueue = (): ReplayQueue => ({
  start: () => Promise.resolve(),
  wake: () => undefined,
  cancel: () => undefined,
  trace: () => Promise.reject(new Error('this queue works nothing off')),
  stop: () => Promise.resolve(),
});
