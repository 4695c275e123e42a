import type { Finding } from '../model/design';
import { noiseBandwidth } from '../loop/noise-bandwidth';
import { closedLoopShape } from '../loop/response-curves';
import { finding, passed, remedyUnless, say, setTo } from './finding';
import type { Remedy, Severity } from './finding';
import { bandwidthPointer, numberOf, pointerOf, stageName, worstStage } from './loop-view';
import type { LoopView, StageView } from './loop-view';
import { narrowerLoop } from './narrower';
import { fieldNumber } from '../plan/fields';

/** Somewhat above the 3.3 dB of ζ = 1/2. */
const mostPeakingDb = 4;
/** Below this damping the gains and not the delay make the peak. */
const ringingDamping = 0.5;

/** How much a loop amplifies jitter near its own frequency. */
export function peakingFindings(view: LoopView): Finding[] {
  const worst = worstStage(view, ({ result }) => result.peakingDb);
  if (!worst) return [];
  const { at, value } = worst;
  const severity: Severity = value > mostPeakingDb ? 'caution' : 'pass';
  return [
    finding({
      slug: 'stability.peaking',
      severity,
      title: passed(severity, `${view.title} peaks little`, `${view.title} peaks near its own frequency`),
      value,
      limit: mostPeakingDb,
      sense: 'max',
      unit: 'dB',
      reason: `${stageName(at)} makes jitter near its own frequency ${say(value)} dB larger; after a step it rings.`,
      ...remedyUnless(severity, () => lessPeaking(view, at)),
      fields: [bandwidthPointer(at), pointerOf(view, 'delay')],
      source: 'closed loop with its delay, exact; 4 dB is common practice',
    }),
  ];
}

function lessPeaking(view: LoopView, at: StageView): Remedy {
  const { damping } = at.stage;
  const pointer = `/${at.key}/stages/${at.index}/damping`;
  if (damping !== undefined && damping < ringingDamping)
    return setTo(`${fieldNumber(pointer)} of ${at.stage.name}`, pointer, 0.71, '0.71');
  return (
    narrowerLoop(
      at,
      (loop) => noiseBandwidth(loop) !== null && closedLoopShape(loop, 1).peakingDb <= mostPeakingDb,
    ) ?? { remedy: `Raise the damping, or shorten ${numberOf(view, 'delay')}.`, change: null }
  );
}
