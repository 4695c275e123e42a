import { Session, type Profiler } from 'node:inspector/promises';

type Profile = Profiler.Profile;

export interface Share {
  part: string;
  /** Of the time that the processor worked. */
  share: number;
}

/** Parts of a request by what a frame's file or function says, the first that fits along a stack from its root. */
const parts: [part: string, fits: (frame: Profiler.ProfileNode['callFrame']) => boolean][] = [
  ['findings', ({ url }) => url.includes('/shared/findings/')],
  ['solutions', ({ url }) => url.includes('/shared/solve/') || url.includes('/shared/solutions')],
  ['budget and acquisition', ({ url }) => url.includes('/shared/budget/')],
  ['detectors', ({ url }) => url.includes('/shared/detectors/')],
  ['stages of the loops', ({ url }) => url.includes('/shared/loop/')],
  ['words and headroom', ({ url }) => url.includes('/shared/fixed-point/')],
  ['registers', ({ url }) => url.includes('/shared/registers/')],
  ['defaults and consistency', ({ url }) => url.includes('/shared/plan/')],
  ['rest of the design', ({ url }) => url.includes('/shared/')],
  ['digest', ({ url }) => url.includes('/canonicalize/') || url.includes('/services/digest')],
  ['JSON out', ({ url, functionName }) => url.includes('/express/') && functionName === 'stringify'],
  ['JSON in', ({ url }) => url.includes('/body-parser/') || url.includes('/raw-body/')],
  ['validation', ({ url, functionName }) => url.includes('/validate-body') || /^validate\d*$/.test(functionName)],
  ['database', ({ url }) => /\/(knex|mysql2|tarn)\//.test(url)],
  ['signing in', ({ url }) => /\/(jsonwebtoken|jws|passport|passport-jwt)\//.test(url)],
];

/** Profiles this process while something runs. */
export async function profiled(work: () => Promise<void>): Promise<Profile> {
  const session = new Session();
  session.connect();
  try {
    await session.post('Profiler.enable');
    await session.post('Profiler.setSamplingInterval', { interval: 200 });
    await session.post('Profiler.start');
    await work();
    return (await session.post('Profiler.stop')).profile;
  } finally {
    session.disconnect();
  }
}

/** Shares of the parts, largest first; the bench's own client counts as HTTP. */
export function sharesOf({ nodes, samples = [], timeDeltas = [] }: Profile): Share[] {
  const partOfNode = partsOfNodes(nodes);
  const time = new Map<string, number>();
  samples.forEach((id, i) => {
    const part = partOfNode.get(id) ?? 'HTTP and the rest';
    time.set(part, (time.get(part) ?? 0) + timeDeltas[i]!);
  });
  time.delete('idle');
  const whole = [...time.values()].reduce((sum, value) => sum + value, 0);
  return [...time]
    .map(([part, value]) => ({ part, share: value / whole }))
    .sort((one, other) => other.share - one.share);
}

function partsOfNodes(nodes: Profile['nodes']): Map<number, string> {
  const byId = new Map(nodes.map((node) => [node.id, node]));
  const found = new Map<number, string>();
  const visit = (id: number, above: string | undefined): void => {
    const { callFrame, children = [] } = byId.get(id)!;
    const part = above ?? partOfFrame(callFrame);
    if (part) found.set(id, part);
    for (const child of children) visit(child, part);
  };
  visit(nodes[0]!.id, undefined);
  return found;
}

function partOfFrame(frame: Profiler.ProfileNode['callFrame']): string | undefined {
  if (frame.functionName === '(idle)' || frame.functionName === '(program)') return 'idle';
  if (frame.functionName === '(garbage collector)') return 'garbage collection';
  // The design's own files only put parts together.
  if (/\/shared\/design[/.]/.test(frame.url)) return undefined;
  return parts.find(([, fits]) => fits(frame))?.[0];
}
