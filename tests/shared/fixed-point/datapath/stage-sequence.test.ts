import { describe, expect, it } from 'vitest';
import { stageSequence } from '../../../../shared/fixed-point/datapath/stage-sequence';

const none = { mantissa: 0, shift: 0 };
const stage = (untilSymbols: number | null, lockThreshold: number | null) => ({
  proportional: none,
  integral: none,
  integral2: none,
  untilSymbols,
  lockThreshold,
});

describe('stageSequence', () => {
  it('counts symbols but changes only where an update ends', () => {
    const sequence = stageSequence([stage(2, null), stage(null, null)]);
    const stages = [false, false, false, true].map((updated) => {
      sequence.endSymbol(updated);
      return sequence.stage;
    });
    expect(stages).toEqual([0, 0, 0, 1]);
  });

  it('changes at a block in lock, update or not, and stays in the last stage', () => {
    const sequence = stageSequence([stage(null, 128), stage(1, 0)]);
    sequence.endSymbol(false, (threshold) => threshold > 128);
    expect(sequence.stage).toBe(0);
    sequence.endSymbol(false, (threshold) => threshold === 128);
    expect(sequence.stage).toBe(1);
    sequence.endSymbol(true, () => true);
    expect(sequence.stage).toBe(1);
  });
});
