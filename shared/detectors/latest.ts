/**
 * Keeps the latest few results of a calculation by a key that names all that it depends on. What is kept is handed out
 * again, so nobody may change it.
 *
 * @param count results that are kept, the least lately used goes first
 */
export function latest<T>(count: number): (key: string, make: () => T) => T {
  const results = new Map<string, T>();
  return (key, make) => {
    const result = results.get(key) ?? make();
    results.delete(key);
    results.set(key, result);
    if (results.size > count) results.delete(results.keys().next().value as string);
    return result;
  };
}
