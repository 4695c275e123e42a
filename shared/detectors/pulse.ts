const sinc = (t: number): number => (t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t));

/**
 * Raised-cosine pulse g(t) of unit height with roll-off α, 0 to 1, t in symbols: what a root-raised-cosine
 * transmitter and its matched filter make together. With u = 2α|t|, cos(πu/2)/(1 − u²) is written
 * (π/2)·sinc((1 − u)/2)/(1 + u), which stays accurate where u = 1.
 */
export function raisedCosine(t: number, rollOff: number): number {
  const u = 2 * rollOff * Math.abs(t);
  return (sinc(t) * (Math.PI / 2) * sinc((1 - u) / 2)) / (1 + u);
}
