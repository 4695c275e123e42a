/** A value of x between two others at which a continuous function changes sign, to the last few bits. */
export function bisect(sign: (x: number) => number, from: number, to: number): number {
  let [low, high] = [from, to];
  const rising = sign(high) > 0;
  for (let round = 0; round < 80; round += 1) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    if (sign(middle) > 0 === rising) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}

/** Largest value of a function around the middle of three points, by golden section. */
export function largestBetween(
  value: (x: number) => number,
  from: number,
  to: number,
  rounds = 40,
): { x: number; value: number } {
  const share = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  for (let round = 0; round < rounds; round += 1) {
    const [left, right] = [high - share * (high - low), low + share * (high - low)];
    if (value(left) < value(right)) low = left;
    else high = right;
  }
  const x = (low + high) / 2;
  return { x, value: value(x) };
}
