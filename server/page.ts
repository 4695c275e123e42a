import type { Knex } from 'knex';

/** A part of a list in the order of its ids. */
export interface Page {
  limit: number;
  /** The part begins behind this id. */
  after: number | undefined;
}

export interface Items<Item> {
  items: Item[];
  /** Cursor of the next part; null at the end. */
  next: string | null;
}

/** Narrows a query to one page, one row more than asked for: whether there is a next page shows in that row. */
export function paged<Q extends Knex.QueryBuilder>(query: Q, column: string, page: Page, order: 'asc' | 'desc'): Q {
  if (page.after !== undefined) void query.where(column, order === 'asc' ? '>' : '<', page.after);
  return query.orderBy(column, order).limit(page.limit + 1) as Q;
}

/** Cuts off the row too many and names the next page by the last row that stays. */
export function itemsOf<Item extends { id: number }>(rows: Item[], { limit }: Page): Items<Item> {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  const more = rows.length > limit && last;
  return { items, next: more ? Buffer.from(String(last.id)).toString('base64url') : null };
}
