const asymptoticFrom = 30;

/**
 * ln I0(x), I0 the modified Bessel function of the first kind, for any x of 0 or more: its power series, and from 30 on
 * the asymptotic one, whose terms there fall below the last digit before they rise again.
 *
 * @see M. Abramowitz, I. Stegun, "Handbook of Mathematical Functions", 9.6.12 and 9.7.1
 */
export function logBesselI0(x: number): number {
  return x < asymptoticFrom ? Math.log(powerSeries(x)) : x - Math.log(2 * Math.PI * x) / 2 + Math.log(asymptotic(x));
}

/** Σ (x/2)^2k/(k!)². */
function powerSeries(x: number): number {
  let [sum, term] = [1, 1];
  for (let k = 1; term > 1e-17 * sum; k += 1) {
    term *= (x / (2 * k)) ** 2;
    sum += term;
  }
  return sum;
}

/** Σ (1·3·…·(2k − 1))²/(k!·(8x)^k). */
function asymptotic(x: number): number {
  let [sum, term] = [1, 1];
  for (let k = 1; term > 1e-17 * sum && (2 * k - 1) ** 2 < 8 * k * x; k += 1) {
    term *= (2 * k - 1) ** 2 / (8 * k * x);
    sum += term;
  }
  return sum;
}
