import { workOut } from '../../shared/design';
import { carrierNodes } from '../../shared/fixed-point/datapath/carrier-nodes';
import { carrierRunner } from '../../shared/fixed-point/datapath/carrier-runner';
import { NodeChecksum } from '../../shared/replay/node-checksum';
import { runTrial } from '../../shared/replay/receiver';
import type { ReplayJob } from '../../shared/replay/job';
import { carrierInC, type Run } from './carrier-in-c';
import { demoJob, plan, samplesOf, type Samples } from './demo-carrier';

/*
 * Throughput side by side with C on this machine, and the time that a design takes. It measures and asserts nothing:
 * times differ between machines, ratios hardly.
 */
const symbols = 2 ** 18;
/** Symbols of one block, as in a replay. */
const blockSymbols = 256;
const passes = 20;
const rounds = 7;
const designs = 400;
/** What a design may take, ms. */
const designBar = 10;

function timed(work: () => void): number {
  const begin = performance.now();
  work();
  return (performance.now() - begin) / 1000;
}

/** Nearest-rank percentile. */
function percentile(values: readonly number[], percent: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.ceil((percent * sorted.length) / 100) - 1]!;
}

const median = (values: readonly number[]): number => percentile(values, 50);

/** The datapath over the samples, block by block as a replay runs it, with its checksum. */
function datapath({ words, tables }: ReplayJob, { xI, xQ }: Samples): Run {
  const runner = carrierRunner(words, tables);
  const checksum = new NodeChecksum();
  const nodes = carrierNodes(blockSymbols);
  const known = new Uint8Array(blockSymbols);
  const seconds = timed(() => {
    for (let pass = 0; pass < passes; pass++) {
      for (let from = 0; from < symbols; from += blockSymbols) {
        const to = from + blockSymbols;
        runner.run(xI.subarray(from, to), xQ.subarray(from, to), known, blockSymbols, nodes);
        checksum.add(nodes, blockSymbols);
      }
    }
  });
  return { seconds, checksum: checksum.digits() };
}

/** A whole trial: symbols, noise, carrier, datapath, phase error and checksum. */
function replay(job: ReplayJob, trial: number): number {
  const checksum = new NodeChecksum();
  return timed(() => runTrial(job, 0, trial, ({ nodes, count }) => checksum.add(nodes, count)));
}

const million = (perSecond: number): string => (perSecond / 1e6).toFixed(2);

function throughput(): void {
  const job = demoJob(symbols);
  const samples = samplesOf(job, symbols);
  const c = carrierInC(job, samples);
  try {
    const runs = Array.from({ length: rounds }, (_, round) => ({
      js: datapath(job, samples),
      c: c.run(passes),
      replay: replay(job, round),
    }));
    const same = runs.every((run) => run.js.checksum === run.c.checksum);
    const inC = (symbols * passes) / median(runs.map((run) => run.c.seconds));
    const inJs = (symbols * passes) / median(runs.map((run) => run.js.seconds));
    const whole = symbols / median(runs.map((run) => run.replay));
    console.log(`carrier datapath in C     ${million(inC)} million symbols a second`);
    console.log(`carrier datapath here     ${million(inJs)}, ratio to C ${(inJs / inC).toFixed(3)}`);
    console.log(`whole replay, one thread  ${million(whole)}, ratio to C ${(whole / inC).toFixed(3)}`);
    console.log(`nodes of both             ${same ? 'the same to the bit' : 'DIFFERENT'}`);
  } finally {
    c.remove();
  }
}

/** Every run has another Es/N0, so that nothing is worked out only once. */
function designTimes(): void {
  const vary = (k: number) => ({ ...plan, signal: { ...plan.signal, esN0Db: 8 + (k % 97) / 20 } });
  const times = Array.from({ length: designs }, (_, k) => timed(() => workOut(vary(k))));
  const [middle, p95] = [50, 95].map((percent) => 1000 * percentile(times.slice(designs / 4), percent)) as [
    number,
    number,
  ];
  console.log(
    `design, 2 stages, 2 loops ${middle.toFixed(2)} ms median, ${p95.toFixed(2)} ms p95, ` +
      `ratio of p95 to ${designBar} ms ${(p95 / designBar).toFixed(2)}`,
  );
}

throughput();
designTimes();
