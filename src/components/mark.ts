const samples = 93;
const turns = 2.5;

/** The wave that leads, in a box of 48 × 24. */
export const steady = wave((turn) => 5.7 - 4.8 * Math.sin(2 * Math.PI * turn));

/** The wave that follows: its phase error of 2.5 rad dies away as that of a well damped loop does. */
export const following = wave((turn) => 18.2 - 4.8 * Math.sin(2 * Math.PI * turn - phaseError(turn)));

function phaseError(turn: number): number {
  return 2.5 * Math.exp(-2.4 * turn) * Math.cos(1.1 * turn);
}

function wave(heightAt: (turn: number) => number): string {
  const points = Array.from({ length: samples }, (_, at) => {
    const share = at / (samples - 1);
    return `${(1 + 46 * share).toFixed(1)},${heightAt(turns * share).toFixed(1)}`;
  });
  return `M${points.join('L')}`;
}
