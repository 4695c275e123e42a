import { createPinia, setActivePinia } from 'pinia';
import { beforeEach, describe, expect, it } from 'vitest';
import type { RouteLocationNormalized } from 'vue-router';
import { keepSession } from '../../../src/api/token';
import { guard, returnAddress } from '../../../src/router/guard';
import { useSession } from '../../../src/stores/session';

const to = (fullPath: string, meta = {}) => ({ fullPath, meta }) as RouteLocationNormalized;
const signIn = (role: 'admin' | 'viewer') =>
  keepSession({ accessToken: 't', user: { id: 1, email: 'a@keepstep.example', name: 'A', role } });

describe('guard', () => {
  beforeEach(() => {
    setActivePinia(createPinia());
    useSession();
    keepSession(undefined);
  });

  it('leads a stranger to the sign-in page and remembers the way', () => {
    expect(guard(to('/plans/4?tab=1'))).toEqual({ name: 'sign-in', query: { to: '/plans/4?tab=1' } });
    expect(guard(to('/sign-in', { open: true }))).toBe(true);
  });

  it('lets people in, and only admins to the people', () => {
    signIn('viewer');
    expect(guard(to('/plans'))).toBe(true);
    expect(guard(to('/people', { role: 'admin' }))).toEqual({ name: 'plans' });
    signIn('admin');
    expect(guard(to('/people', { role: 'admin' }))).toBe(true);
  });
});

describe('returnAddress', () => {
  it.each([
    ['/plans/4?tab=1', '/plans/4?tab=1'],
    ['//elsewhere.example/plans', '/plans'],
    ['/\\elsewhere.example', '/plans'],
    ['https://elsewhere.example', '/plans'],
    ['/sign-in?to=/plans', '/plans'],
    [undefined, '/plans'],
  ])('takes %s to %s', (query, path) => {
    expect(returnAddress(query)).toBe(path);
  });
});
