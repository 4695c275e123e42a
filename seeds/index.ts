import type { Plan } from '../shared/model/plan';
import type { ToleranceCheck } from '../shared/model/tolerance-check';
import { withDefaults } from '../server/schemas';
import type { Services } from '../server/services/index';
import type { Revision } from '../server/services/revisions';
import type { SignedIn } from '../server/services/sessions';
import { corvidC1Target } from './corvid-c1-map';
import { corvidC2Target } from './corvid-c2-map';
import { seedPeople } from './people';
import { beacon, hopBurst, ranging, telemetry, transponder17 } from './plans';

/** A plan and its revisions, as a person would save them one after the other. */
async function seedPlan({ plans, revisions }: Services, by: SignedIn, saves: [Plan, string][]): Promise<Revision[]> {
  const complete = saves.map(([plan, note]) => ({ plan: withDefaults('plan', plan), note }));
  const { id } = await plans.create(complete[0]!.plan, by);
  const saved: Revision[] = [];
  for (const [index, save] of complete.entries()) saved.push(await revisions.save(id, index + 1, save, by));
  return saved;
}

type ConfigSet = Record<string, Revision>;

async function seedRelease({ releases }: Services, by: SignedIn, version: string, set: ConfigSet): Promise<number> {
  let release = await releases.create('corvid-c2', version, by);
  for (const [slot, { id }] of Object.entries(set)) {
    release = await releases.putEntry({ id: release.id, version: release.rowVersion, by }, slot, id);
  }
  return release.id;
}

/** Offsets somewhat beyond both ends of the oscillators' tolerance, ±77.5 kHz. */
const bothEnds: ToleranceCheck = {
  name: 'Both ends, 10 dB',
  carrierOffsetHz: { start: -96_000, stop: 96_000, points: 13 },
  esN0Db: [10],
  symbols: 12_000,
  trials: 40,
  seed: 17,
  limits: { lockProbability: 0.9, confidence: 0.95 },
};

/**
 * A small, believable world: an invented modem family with five plans, a frozen release, a draft of the next one and
 * a replay, which is worked off once the server runs.
 *
 * @param services over one transaction
 */
export async function seedDemo(services: Services, password: string): Promise<void> {
  const { engineer, tester, release } = await seedPeople(services, password);
  for (const target of [corvidC1Target, corvidC2Target]) {
    await services.targets.create(withDefaults('target', target), engineer);
  }
  const [, limited, narrow] = await seedPlan(services, engineer, [
    [transponder17(0.006, 60_000), 'First values from the link budget.'],
    [transponder17(0.006, 250_000), 'Integrator limit beyond both ends of the tolerance.'],
    [transponder17(0.004, 250_000), 'Narrower tracking: least jitter with the tuner’s phase noise.'],
  ]);
  const [beaconSaved] = await seedPlan(services, engineer, [[beacon, 'As flown on the engineering model.']]);
  const [rangingSaved] = await seedPlan(services, engineer, [[ranging, 'Ranging channel.']]);
  await seedPlan(services, engineer, [[telemetry, 'Telemetry of the small terminal.']]);
  await seedPlan(services, engineer, [[hopBurst, 'Trial of a fast start.']]);

  const set = { dl_qpsk: limited!, beacon: beaconSaved!, ranging: rangingSaved! };
  const id = await seedRelease(services, release, '2.3.0', set);
  const { rowVersion } = await services.releases.get(id);
  await services.releases.freeze({ id, version: rowVersion, by: release }, '2.3.0');
  await seedRelease(services, release, '2.4.0', { ...set, dl_qpsk: narrow! });
  await services.replays.create({ revisionId: narrow!.id, check: withDefaults('tolerance-check', bothEnds) }, tester);
}
