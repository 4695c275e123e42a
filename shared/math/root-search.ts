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

/** Largest value of a function between two points that has one maximum there, by golden section. */
export function largestBetween(
  value: (x: number) => number,
  from: number,
  to: number,
  rounds = 40,
): { x: number; value: number } {
  const share = (Math.sqrt(5) - 1) / 2;
  let [low, high] = [from, to];
  let left = pointAt(value, high - share * (high - low));
  let right = pointAt(value, low + share * (high - low));
  for (let round = 0; round < rounds; round += 1) {
    if (left.value < right.value) {
      [low, left] = [left.x, right];
      right = pointAt(value, low + share * (high - low));
    } else {
      [high, right] = [right.x, left];
      left = pointAt(value, high - share * (high - low));
    }
  }
  return left.value > right.value ? left : right;
}

const pointAt = (value: (x: number) => number, x: number) => ({ x, value: value(x) });
