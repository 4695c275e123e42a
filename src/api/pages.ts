import { api } from './client';

/** One page of a list; `next` is the cursor of the following one, null at the end. */
export interface Page<Item> {
  items: Item[];
  next: string | null;
}

const largest = 100;

/** One page of a list, the first without a cursor. */
export function page<Item>(path: string, cursor: string | null = null, limit = largest): Promise<Page<Item>> {
  const query = new URLSearchParams({ limit: String(limit), ...(cursor ? { cursor } : {}) });
  return api.get<Page<Item>>(`${path}${path.includes('?') ? '&' : '?'}${query.toString()}`);
}

/** Every item of a list that is short enough to be shown whole. */
export async function everyPage<Item>(path: string): Promise<Item[]> {
  const items: Item[] = [];
  let cursor: string | null = null;
  do {
    const read: Page<Item> = await page<Item>(path, cursor);
    items.push(...read.items);
    cursor = read.next;
  } while (cursor);
  return items;
}
