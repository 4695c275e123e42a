import type { Role } from '../server/roles';
import type { Services } from '../server/services/index';
import type { SignedIn } from '../server/services/sessions';

const accounts: { name: string; role: Role }[] = [
  { name: 'Ines Maro', role: 'engineer' },
  { name: 'Malin Duarte', role: 'tester' },
  { name: 'Rui Adeyemi', role: 'release' },
  { name: 'Sol Lindqvist', role: 'viewer' },
  { name: 'Edda Brandt', role: 'admin' },
];

/** One person for each role, `engineer@keepstep.example` and so on, all with the same password. */
export async function seedPeople({ people, passwords }: Services, password: string): Promise<Record<Role, SignedIn>> {
  const seeded: Partial<Record<Role, SignedIn>> = {};
  for (const { name, role } of accounts) {
    const { person, link } = await people.invite({ email: `${role}@keepstep.example`, name, role }, null);
    await passwords.setByLink(link.split('/').at(-1)!, password);
    seeded[role] = { id: person.id, email: person.email, name, role, sessionId: 0 };
  }
  return seeded as Record<Role, SignedIn>;
}
