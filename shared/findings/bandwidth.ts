import type { Finding } from '../model/design';
import { stageLoop } from '../loop/stage-loop';
import { ParameterError } from '../parameter-error';
import { finding, passed, remedyUnless, say, setTo, twoDigitsDown } from './finding';
import type { Remedy, Severity } from './finding';
import { askedOf, bandwidthPointer, numberOf, pointerOf, stageName, worstStage } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { setBandwidth } from './narrower';

/** Deviation from the wanted bandwidth that still goes by the same name, %. */
const mostDeviation = 10;
const mostDelayProduct = 0.1;

export const bandwidthFindings = (view: LoopView): Finding[] => [...exactAgainstWanted(view), ...delayProduct(view)];

function exactAgainstWanted(view: LoopView): Finding[] {
  const worst = worstStage(view, ({ result: { noiseBandwidth } }) => deviation(noiseBandwidth));
  if (!worst) return [];
  const severity: Severity = worst.value > mostDeviation ? 'caution' : 'pass';
  const { wanted, exact } = worst.at.result.noiseBandwidth as { wanted: number; exact: number };
  return [
    finding({
      slug: 'bandwidth.exact-against-wanted',
      severity,
      title: passed(severity, `${view.title} has the wanted bandwidth`, `${view.title} misses the wanted bandwidth`),
      value: worst.value,
      limit: mostDeviation,
      sense: 'max',
      unit: '%',
      reason: `${stageName(worst.at)} asks for BnT ${say(wanted)} and has ${say(exact, 4)} with its delay. Jitter and acquisition follow what it has.`,
      ...remedyUnless(severity, () => takeExact(view, worst.at)),
      fields: [pointerOf(view, 'method'), bandwidthPointer(worst.at), pointerOf(view, 'delay')],
      source: 'noise bandwidth with the delay, exact; the limit is common practice',
    }),
  ];
}

const deviation = ({ wanted, exact }: { wanted: number | null; exact: number | null }): number | null =>
  wanted === null || exact === null ? null : 100 * Math.abs(exact / wanted - 1);

/** “Set 2.5 to exact”, where every stage can be reached that way. */
function takeExact(view: LoopView, at: StageView): Remedy | null {
  const pointer = pointerOf(view, 'method');
  if (canBeExact(view)) return setTo(numberOf(view, 'method'), pointer, 'exact', 'exact');
  return {
    remedy: `Lower ${numberOf(at, `stages/${at.index}/noiseBandwidth`)} or shorten ${numberOf(view, 'delay')}: with this delay no gains reach it.`,
    change: null,
  };
}

function canBeExact({ key, loop, plan }: LoopView): boolean {
  try {
    loop.stages.forEach((stage, i) =>
      stageLoop({
        pointer: `/${key}/stages/${i}`,
        stage,
        loop: { ...loop, method: 'exact' },
        symbolRateBd: plan.signal.symbolRateBd,
      }),
    );
    return true;
  } catch (error) {
    if (error instanceof ParameterError) return false;
    throw error;
  }
}

function delayProduct(view: LoopView): Finding[] {
  const { delay, updateInterval } = view.loop;
  const worst = worstStage(view, ({ result }) => {
    const bandwidth = result.noiseBandwidth.wanted ?? result.noiseBandwidth.exact;
    return bandwidth === null ? null : delay * bandwidth * updateInterval;
  });
  if (!worst) return [];
  const severity: Severity = worst.value > mostDelayProduct ? 'caution' : 'pass';
  return [
    finding({
      slug: 'bandwidth.delay-product',
      severity,
      title: passed(severity, `${view.title} can bear its delay`, `${view.title} is wide for its delay`),
      value: worst.value,
      limit: mostDelayProduct,
      sense: 'max',
      reason: `${stageName(worst.at)} has ${say(worst.value)} for delay (${numberOf(view, 'delay')}) times noise bandwidth. Above 0.1 the delay decides the response, not the gains.`,
      ...remedyUnless(severity, () => shrinkTo(worst.at, mostDelayProduct / worst.value)),
      fields: [pointerOf(view, 'delay'), bandwidthPointer(worst.at)],
      source: 'common practice',
    }),
  ];
}

const shrinkTo = (at: StageView, share: number): Remedy => setBandwidth(at, twoDigitsDown(share * askedOf(at)));
