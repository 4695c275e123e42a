export const roles = ['engineer', 'tester', 'release', 'viewer', 'admin'] as const;

export type Role = (typeof roles)[number];

/** Who may call a route: anyone, signed in or not, or the people of these roles. */
export type Allowed = 'open' | readonly Role[];

export const everyone: readonly Role[] = roles;
