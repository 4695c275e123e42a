/**
 * A pure function that keeps its latest results, the oldest making way for the newest.
 *
 * @param keyOf one text for each argument that means something else
 * @param size results kept
 */
export function boundedMemo<Input, Result>(
  of: (input: Input) => Result,
  keyOf: (input: Input) => string,
  size: number,
): (input: Input) => Result {
  const kept = new Map<string, Result>();
  return (input) => {
    const key = keyOf(input);
    const known = kept.get(key);
    if (known !== undefined) return known;
    const result = of(input);
    if (kept.size >= size) kept.delete(kept.keys().next().value!);
    kept.set(key, result);
    return result;
  };
}
