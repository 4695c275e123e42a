import { execFileSync } from 'node:child_process';
import { copyFileSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { detectorLsbLog2 } from '../../shared/fixed-point/datapath/phase-detector';
import { wholeCircle } from '../../shared/fixed-point/rotator-table';
import type { CarrierWords } from '../../shared/model/words';
import type { ReplayJob } from '../../shared/replay/job';
import type { Samples } from './demo-carrier';

/** How long a run took and what its nodes add up to. */
export interface Run {
  seconds: number;
  checksum: string;
}

const source = fileURLToPath(new URL('carrier.c', import.meta.url));

/** The C program refuses nothing: what it does not cover would only give another checksum. */
function requireCovered({ detector, modulation, order, rounding, overflow, ...words }: CarrierWords): void {
  const covered =
    detector === 'sign' &&
    modulation === 'qpsk' &&
    order === 2 &&
    rounding === 'nearest' &&
    words.symbolsPerUpdate === 1 &&
    words.updatesPerSymbol === 1 &&
    words.nco.stepsPerSymbol === 1 &&
    words.integratorLimit !== null &&
    words.stages.every(({ lockThreshold }) => lockThreshold === null) &&
    Object.values(overflow).every((mode) => mode === 'saturate');
  if (!covered) throw new Error('carrier.c does not cover this plan');
}

const define = (name: string, value: number | string): string => `#define ${name} ${value}`;

/** The plan's integers as C. */
function wordsHeader({ words, tables }: ReplayJob): string {
  const { cosine, sine } = wholeCircle(tables);
  const errorShift = words.errorFullScaleLog2 - (words.errorBits - 1) - detectorLsbLog2(words);
  const stages = words.stages.map(
    ({ proportional: p, integral: i, untilSymbols }) =>
      `{ ${p.mantissa}, ${i.mantissa}, ${p.shift}, ${i.shift}, ${untilSymbols ?? 0} }`,
  );
  return [
    define('NCO_BITS', words.nco.widthBits),
    define('PHASE_BITS', words.nco.phaseBits),
    define('TABLE_BITS', words.tableBits),
    define('SAMPLE_BITS', words.sampleBits),
    define('ERROR_BITS', words.errorBits),
    define('ERROR_SHIFT', `(${errorShift})`),
    define('INTEGRATOR_BITS', words.integratorBits),
    define('GUARD_BITS', words.guardBits),
    define('DELAY', words.delay),
    define('LIMIT', `INT64_C(${words.integratorLimit})`),
    define('FCW', `UINT64_C(${words.nco.fcw})`),
    'struct gains { int64_t p, i; int p_shift, i_shift, symbols; };',
    `static const struct gains stages[] = { ${stages.join(', ')} };`,
    `static const int32_t cosine[] = { ${cosine.join(', ')} };`,
    `static const int32_t sine[] = { ${sine.join(', ')} };`,
    '',
  ].join('\n');
}

/**
 * Compiles the C program with the words of a job and gives a function that runs it over the samples again and again.
 *
 * @throws {Error} without gcc, and for words that the program does not cover
 */
export function carrierInC(job: ReplayJob, { xI, xQ }: Samples): { run: (passes: number) => Run; remove: () => void } {
  requireCovered(job.words);
  const folder = mkdtempSync(join(tmpdir(), 'keepstep-bench-'));
  const [program, file] = [join(folder, 'carrier'), join(folder, 'samples')];
  const pairs = Int16Array.from({ length: 2 * xI.length }, (_, k) => (k % 2 === 0 ? xI : xQ)[k >> 1]!);
  writeFileSync(join(folder, 'words.h'), wordsHeader(job));
  writeFileSync(file, pairs);
  copyFileSync(source, join(folder, 'carrier.c'));
  execFileSync('gcc', ['-std=c99', '-O2', '-Wall', '-Wextra', '-o', program, join(folder, 'carrier.c')]);
  return {
    run(passes) {
      const output = execFileSync(program, [file, String(xI.length), String(passes)], { encoding: 'utf8' });
      const [seconds, checksum] = output.trim().split(' ') as [string, string];
      return { seconds: Number(seconds), checksum };
    },
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}
