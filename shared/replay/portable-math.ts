/*
 * Engines may differ in the last bit of Math.exp, Math.sin and Math.cos, and one bit can tip a rounded sample. These
 * use only + − × ÷ and rounding to integers, which IEEE 754 fixes, so a trial is the same on every machine.
 */

// ln 2 in two parts: the first has so few digits that a whole multiple of it is exact.
const ln2High = 0.693145751953125;
const ln2Low = 1.428606820309417e-6;

/** e^x for |x| ≤ 700, within a few units of the last place. */
export function exponential(x: number): number {
  const power = Math.floor(x / Math.LN2 + 0.5);
  const rest = x - power * ln2High - power * ln2Low;
  let term = 1;
  let sum = 1;
  for (let n = 1; n <= 16; n++) sum += term *= rest / n;
  return sum * 2 ** power;
}

/** The ratio of a level in dB, 10^(dB/10), for |dB| ≤ 1000. */
export const powerRatio = (levelDb: number): number => exponential((levelDb * Math.LN10) / 10);

/** Cosine and sine of an angle given in turns, any finite number of them. */
export function onCircle(turns: number): [number, number] {
  const quarter = Math.floor(4 * turns + 0.5);
  const angle = 2 * Math.PI * (turns - quarter / 4);
  const [c, s] = nearAxis(angle);
  const quadrant = ((quarter % 4) + 4) % 4;
  if (quadrant === 0) return [c, s];
  if (quadrant === 1) return [-s, c];
  return quadrant === 2 ? [-c, -s] : [s, -c];
}

/** Power series of cosine and sine for |angle| ≤ π/4. */
function nearAxis(angle: number): [number, number] {
  let cosine = 0;
  let sine = 0;
  let term = 1;
  for (let n = 0; n < 18; n += 2) {
    cosine += term;
    term *= angle / (n + 1);
    sine += term;
    term *= -angle / (n + 2);
  }
  return [cosine, sine];
}
