import { once } from 'node:events';
import { Agent, createServer, request } from 'node:http';
import type { AddressInfo } from 'node:net';
import express, { type Express } from 'express';
import { corvidC2Target } from '../../seeds/corvid-c2-map';
import { transponder17 } from '../../seeds/plans';
import { accessToken } from '../../server/services/access-tokens';
import type { Plan } from '../../shared/model/plan';
import { setup } from '../support/database';
import { startTestServer, testSecret, type TestServer } from '../support/test-server';
import { profiled, sharesOf } from './profile-shares';

/*
 * Server time of POST /api/v1/designs: two stages on both loops with every curve, from the first middleware to the last
 * byte handed over, on a throw-away database. Every request has another value, as when somebody types, so that nothing
 * is worked out only once. It measures and asserts nothing.
 */
const requests = 400;
const warmUp = 60;
const profiledRequests = 100;
/** What the p95 is held to, ms. */
const bar = 10;

interface Link {
  label: string;
  signal: Partial<Plan['signal']>;
  carrier: Partial<Plan['carrier']>;
  clock: Partial<Plan['clock']>;
}

/** The demo's link on other waveforms and detectors. */
const links: Link[] = [
  { label: 'QPSK sign, Gardner', signal: {}, carrier: {}, clock: {} },
  {
    label: 'BPSK Costas, zero-crossing',
    signal: { modulation: 'BPSK' },
    carrier: { detector: 'costas' },
    clock: { detector: 'zero-crossing' },
  },
  {
    label: '8PSK decision, Mueller-Müller',
    signal: { modulation: '8PSK', esN0Db: 16, samplesPerSymbol: 1 },
    carrier: { detector: 'decision' },
    clock: { detector: 'mueller-muller' },
  },
  {
    label: 'OQPSK sign, no clock loop',
    signal: { modulation: 'OQPSK' },
    carrier: { detector: 'sign' },
    clock: {},
  },
  {
    label: '16APSK decision, early-late',
    signal: { modulation: '16APSK', esN0Db: 16, samplesPerSymbol: 4 },
    carrier: { detector: 'decision' },
    clock: { detector: 'early-late' },
  },
  {
    label: '32APSK decision, Gardner, order 3',
    signal: { modulation: '32APSK', esN0Db: 20 },
    carrier: { detector: 'decision', order: 3 },
    clock: {},
  },
  {
    label: '64QAM decision, Gardner, exact',
    signal: { modulation: '64QAM', esN0Db: 24 },
    carrier: { detector: 'decision', method: 'exact' },
    clock: { method: 'exact' },
  },
  {
    label: 'QPSK power law, delay 40, exact',
    signal: {},
    carrier: { detector: 'power-law', method: 'exact', delay: 40, updateInterval: 2 },
    clock: { method: 'exact', delay: 20, interpolator: 'polyphase' },
  },
];

/** What somebody types: the k-th value of one field. */
const typing = {
  'Es/N0': (plan: Plan, k: number) => {
    plan.signal.esN0Db = plan.signal.esN0Db! + (k % 389) / 200;
  },
  bandwidth: (plan: Plan, k: number) => {
    for (const loop of [plan.carrier, plan.clock]) {
      for (const stage of loop?.stages ?? []) stage.noiseBandwidth! *= 1 - (k % 389) / 1000;
    }
  },
};
type Typed = keyof typeof typing;

function planOf({ label, signal, carrier, clock }: Link, typed: Typed, k: number): Plan {
  const plan = structuredClone(transponder17(0.004, 250_000));
  plan.name = label;
  Object.assign(plan.signal, signal);
  Object.assign(plan.carrier!, carrier);
  if (signal.modulation === 'OQPSK') delete plan.clock;
  else Object.assign(plan.clock!, clock);
  if (plan.carrier?.order === 3) for (const stage of plan.carrier.stages) delete stage.damping;
  typing[typed](plan, k);
  return plan;
}

/** Nearest-rank percentile. */
function percentile(values: readonly number[], percent: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.ceil((percent * sorted.length) / 100) - 1]!;
}

/** The application with a watch before it; `times` grows by one entry a response, ms. */
function watched(app: Express, times: number[]): Express {
  const outer = express();
  outer.use((_req, res, next) => {
    const begin = performance.now();
    res.on('finish', () => times.push(performance.now() - begin));
    next();
  });
  return outer.use(app);
}

interface Answer {
  status: number;
  text: string;
}

type Post = (plan: Plan) => Promise<Answer>;

/** One connection that stays open, as a browser's does. */
function poster(port: number, token: string): Post {
  const agent = new Agent({ keepAlive: true, maxSockets: 1 });
  const headers = { 'Content-Type': 'application/json', Authorization: `Bearer ${token}` };
  return (plan) =>
    new Promise((resolve, reject) => {
      const call = request({ agent, port, method: 'POST', path: '/api/v1/designs', headers }, (res) => {
        const parts: Buffer[] = [];
        res.on('data', (part: Buffer) => parts.push(part));
        res.on('end', () => resolve({ status: res.statusCode!, text: Buffer.concat(parts).toString() }));
      });
      call.on('error', reject).end(JSON.stringify({ plan }));
    });
}

/** Types into one field for a while. @returns the last answer */
async function type(post: Post, link: Link, typed: Typed, count: number): Promise<Answer> {
  let last: Answer = { status: 0, text: '' };
  for (let k = 0; k < count; k++) last = await post(planOf(link, typed, k));
  return last;
}

const columns = (values: readonly number[]): string =>
  [50, 95].map((percent) => percentile(values, percent).toFixed(2).padStart(7)).join(' ');

async function measured(post: Post, times: number[], link: Link, typed: Typed): Promise<number[]> {
  const { status, text } = await type(post, link, typed, warmUp);
  if (status !== 200) {
    console.log(`${link.label.padEnd(36)} refused: ${text}`);
    return [];
  }
  times.length = 0;
  await type(post, link, typed, requests);
  const kilobytes = (text.length / 1000).toFixed(0).padStart(4);
  console.log(`${link.label.padEnd(36)} ${typed.padEnd(10)} ${columns(times)} ${kilobytes}`);
  return [...times];
}

const eachTyped = links.flatMap((link) => (Object.keys(typing) as Typed[]).map((typed) => ({ link, typed })));

async function run(server: TestServer): Promise<void> {
  await server.as('engineer').post('/targets', corvidC2Target).expect(201);
  const times: number[] = [];
  const listening = createServer(watched(server.app, times)).listen(0);
  await once(listening, 'listening');
  const { id, sessionId } = server.people.engineer;
  const post = poster((listening.address() as AddressInfo).port, accessToken(id, sessionId, testSecret, new Date()));
  try {
    console.log(`${'POST /api/v1/designs, ms of server time'.padEnd(40)} typed      p50     p95   kB`);
    const runs: { link: Link; typed: Typed; times: number[] }[] = [];
    for (const each of eachTyped) runs.push({ ...each, times: await measured(post, times, each.link, each.typed) });
    const all = runs.flatMap((run) => run.times);
    console.log(`${'all'.padEnd(47)} ${columns(all)}`);
    console.log(`ratio of p95 to ${bar} ms ${(percentile(all, 95) / bar).toFixed(2)}`);
    const profile = await profiled(async () => {
      for (const { link, typed } of runs.filter((run) => run.times.length > 0)) {
        await type(post, link, typed, profiledRequests);
      }
    });
    console.log('\nwhere the time goes, share of what is not idle');
    for (const { part, share } of sharesOf(profile)) console.log(`${part.padEnd(30)} ${(100 * share).toFixed(1)} %`);
  } finally {
    listening.close();
    listening.closeAllConnections();
  }
}

const endDatabase = await setup();
const server = await startTestServer();
try {
  await run(server);
} finally {
  await server.stop();
  await endDatabase?.();
}
