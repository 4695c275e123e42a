/** Keys of a plan that read in their own order; the rest go by the alphabet. */
const leading = ['name', 'target', 'signal', 'carrier', 'clock', 'environment', 'limits'];

const rank = (key: string): number => (leading.includes(key) ? leading.indexOf(key) : leading.length);

const byKey = ([a]: [string, unknown], [b]: [string, unknown]): number => {
  const byRank = rank(a) - rank(b);
  if (byRank !== 0) return byRank;
  return a < b ? -1 : 1;
};

/**
 * The same value with its keys in an order that depends on the keys alone: two equal plans whose keys were typed in
 * another order give the same bytes. Keys without a value are left out.
 */
export function stableOrder<T>(value: T): T {
  if (Array.isArray(value)) return value.map(stableOrder) as T;
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).filter(([, each]) => each !== undefined);
  return Object.fromEntries(entries.sort(byKey).map(([key, each]) => [key, stableOrder<unknown>(each)])) as T;
}
