/** sin(πt)/(πt). */
const sinc = (t: number): number => (t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t));

/** Its derivative; near 0 by its series, because cos(πt) − sinc(t) cancels there. */
function sincSlope(t: number): number {
  const square = (Math.PI * t) ** 2;
  if (square < 0.01)
    return ((-Math.PI * Math.PI * t) / 3) * (1 - (square / 10) * (1 - (square / 28) * (1 - square / 54)));
  return (Math.cos(Math.PI * t) - sinc(t)) / t;
}

/**
 * Raised-cosine pulse g(t) of unit height with roll-off α, 0 to 1, t in symbols: what a root-raised-cosine
 * transmitter and its matched filter make together. With u = 2α|t|, cos(πu/2)/(1 − u²) is written
 * (π/2)·sinc((1 − u)/2)/(1 + u), which stays accurate where u = 1.
 */
export function raisedCosine(t: number, rollOff: number): number {
  const u = 2 * rollOff * Math.abs(t);
  return (sinc(t) * (Math.PI / 2) * sinc((1 - u) / 2)) / (1 + u);
}

/** Slope g′(t) of that pulse, per symbol. */
export function raisedCosineSlope(t: number, rollOff: number): number {
  const u = 2 * rollOff * Math.abs(t);
  const [edge, edgeSlope] = [sinc((1 - u) / 2), sincSlope((1 - u) / 2)];
  const rolled = ((Math.PI / 2) * edge) / (1 + u);
  const rolledSlope = -Math.PI * rollOff * Math.sign(t) * (edgeSlope / 2 / (1 + u) + edge / (1 + u) ** 2);
  return sincSlope(t) * rolled + sinc(t) * rolledSlope;
}

/** Spectrum G(f) of that pulse, f in cycles per symbol: 1 in the flat band, 0 from (1 + α)/2 on. */
export function raisedCosineSpectrum(f: number, rollOff: number): number {
  const beyond = Math.abs(f) - (1 - rollOff) / 2;
  if (beyond <= 0) return 1;
  return beyond >= rollOff ? 0 : Math.cos((Math.PI * beyond) / (2 * rollOff)) ** 2;
}

/**
 * ∫ G(f + ½)·G(f − ½)·cos 2πfτ df = (α/8)·sinc(ατ)/(1 − (ατ)²): what the two roll-offs of neighbouring images share.
 */
export function sharedRollOff(lag: number, rollOff: number): number {
  const u = rollOff * Math.abs(lag);
  const window = u < 0.5 ? sinc(u) / (1 - u * u) : sinc(1 - u) / (u * (1 + u));
  return (rollOff / 8) * window;
}

/** Autocorrelation ∫ G²(f) cos 2πfτ df of the pulse: what random data gives a receiver on the mean over a symbol. */
export const pulseAutocorrelation = (lag: number, rollOff: number): number =>
  raisedCosine(lag, rollOff) - 2 * Math.cos(Math.PI * lag) * sharedRollOff(lag, rollOff);

/**
 * Σ_j g(t − j)·g(t + τ − j) over all whole j, in closed form: of the spectrum's images only neighbouring ones overlap
 * (Poisson's sum), which leaves g(τ) − 2·[cos πτ − cos 2π(t + τ/2)]·∫ G(f + ½)·G(f − ½)·cos 2πfτ df.
 */
export const sampledCorrelation = (t: number, lag: number, rollOff: number): number =>
  pulseAutocorrelation(lag, rollOff) + 2 * Math.cos(Math.PI * (2 * t + lag)) * sharedRollOff(lag, rollOff);
