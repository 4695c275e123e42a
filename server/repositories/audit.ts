import type { Knex } from 'knex';
import { paged, type Page } from '../page';
import { iso, parsed } from './columns';
import type { PersonName } from './people';

export interface AuditEntry {
  id: number;
  at: string;
  person: PersonName | null;
  action: string;
  subject: string;
  detail: Readonly<Record<string, unknown>>;
}

export interface NewAuditEntry {
  at: Date;
  personId: number | null;
  action: string;
  subject: string;
  detail?: object;
}

interface AuditRow {
  id: number;
  at: Date;
  person_id: number | null;
  person_name: string | null;
  action: string;
  subject: string;
  detail: unknown;
}

const toEntry = ({ person_id, person_name, ...row }: AuditRow): AuditEntry => ({
  id: row.id,
  at: iso(row.at),
  person: person_id === null ? null : { id: person_id, name: person_name! },
  action: row.action,
  subject: row.subject,
  detail: parsed<AuditEntry['detail']>(row.detail),
});

export function auditRepository(db: Knex) {
  return {
    async append({ at, personId, action, subject, detail = {} }: NewAuditEntry): Promise<void> {
      await db('audit').insert({ at, person_id: personId, action, subject, detail: JSON.stringify(detail) });
    },
    async list(page: Page): Promise<AuditEntry[]> {
      const query = db('audit').leftJoin('people', 'people.id', 'audit.person_id');
      const columns = ['audit.*', 'people.name as person_name'];
      return (await paged(query.select<AuditRow[]>(columns), 'audit.id', page, 'desc')).map(toEntry);
    },
  };
}
