export const roles = ['engineer', 'tester', 'release', 'viewer', 'admin'] as const;

export type Role = (typeof roles)[number];
