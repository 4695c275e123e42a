import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import type { Plan } from '../../shared/model/plan';

const schema = JSON.parse(readFileSync(new URL('../../schemas/plan.schema.json', import.meta.url), 'utf8')) as object;
const fillDefaults = new Ajv2020({ useDefaults: true, strict: false }).compile(schema);

/** Any part of a plan, in the shape of the plan. */
export type PlanParts = { [key: string]: unknown };

/** Receiver phase-noise tolerance of satellite broadcast (ETSI EN 302 307-1 annex; from memory), [Hz, dBc/Hz]. */
export const broadcastMask: [number, number][] = [
  [100, -25],
  [1e3, -50],
  [1e4, -73],
  [1e5, -93],
  [1e6, -103],
  [1e7, -114],
];

/** A satellite link: QPSK at 27.5 MBd, roll-off 0.35, with the schema's defaults filled in and some parts replaced. */
export function samplePlan(parts: PlanParts = {}): Plan {
  return filled(
    merged(
      {
        name: 'Transponder 17',
        target: 'corvid-c2',
        signal: { symbolRateBd: 27.5e6, rollOff: 0.35, esN0Db: 10 },
        carrier: { delay: 3, stages: stages(0.01, 0.004) },
        clock: { delay: 3, stages: stages(0.002, 0.0005) },
        environment: {
          carrierFrequencyHz: 1.55e9,
          carrierTolerancePpm: 25,
          clockTolerancePpm: 20,
          phaseNoise: broadcastMask,
        },
      },
      parts,
    ),
  );
}

const stages = (acquire: number, track: number) => [
  { name: 'acquire', noiseBandwidth: acquire, until: { symbols: 8000 } },
  { name: 'track', noiseBandwidth: track },
];

/** A plan as the server hands it on: valid, defaults filled in. */
export function filled(plan: object): Plan {
  if (!fillDefaults(plan)) throw new Error(JSON.stringify(fillDefaults.errors));
  return plan as Plan;
}

/** The first with the second laid over it, objects key by key; undefined removes a key. */
function merged(base: PlanParts, over: PlanParts): PlanParts {
  const result = { ...base };
  for (const [key, value] of Object.entries(over)) {
    if (value === undefined) delete result[key];
    else result[key] = isParts(value) && isParts(base[key]) ? merged(base[key], value) : value;
  }
  return result;
}

const isParts = (value: unknown): value is PlanParts =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
