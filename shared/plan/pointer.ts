/** The keys of a JSON pointer (RFC 6901), `~1` and `~0` undone; none for the whole document. */
export const keysOf = (pointer: string): string[] =>
  pointer
    .split('/')
    .slice(1)
    .map((key) => key.replaceAll('~1', '/').replaceAll('~0', '~'));

type Node = Readonly<Record<string, unknown>>;

const isNode = (value: unknown): value is Node => typeof value === 'object' && value !== null;

/** What stands at a JSON pointer; undefined where nothing does. */
export const valueAt = (root: unknown, pointer: string): unknown =>
  keysOf(pointer).reduce<unknown>(
    (node, key) => (isNode(node) && Object.hasOwn(node, key) ? node[key] : undefined),
    root,
  );

/**
 * A copy of `root` with another value at a pointer; everything beside the path is shared with the original. Missing
 * objects on the way are made. `undefined` takes the key away; in an array it takes the item out.
 */
export const withValue = <Root>(root: Root, pointer: string, value: unknown): Root =>
  replaced(root, keysOf(pointer), value) as Root;

function replaced(node: unknown, keys: readonly string[], value: unknown): unknown {
  const [key, ...rest] = keys;
  if (key === undefined) return value;
  if (Array.isArray(node)) return replacedItem(node, Number(key), rest, value);
  const copy: Record<string, unknown> = isNode(node) ? { ...node } : {};
  const next = replaced(copy[key], rest, value);
  if (next === undefined) delete copy[key];
  else copy[key] = next;
  return copy;
}

function replacedItem(items: readonly unknown[], index: number, rest: readonly string[], value: unknown): unknown[] {
  const next = replaced(items[index], rest, value);
  const gone = next === undefined;
  return items.toSpliced(index, 1, ...(gone ? [] : [next]));
}
