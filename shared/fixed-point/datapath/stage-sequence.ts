import type { Words } from '../../model/words';

/** Which stage's words are loaded: `endSymbol` is called at the end of every symbol. */
export interface StageSequence {
  readonly stage: number;
  /** @param updated whether a loop update ended here · @param blockInLock lock test at a block's end for a threshold T */
  endSymbol(updated: boolean, blockInLock?: (threshold: number) => boolean): void;
}

export function stageSequence(stages: Words['stages']): StageSequence {
  let stage = 0;
  let symbols = 0;
  return {
    get stage() {
      return stage;
    },
    endSymbol(updated, blockInLock) {
      symbols += 1;
      if (stage + 1 >= stages.length) return;
      const { untilSymbols, lockThreshold } = stages[stage]!;
      const ran = updated && untilSymbols !== null && symbols >= untilSymbols;
      const locked = lockThreshold !== null && blockInLock?.(lockThreshold) === true;
      if (!ran && !locked) return;
      stage += 1;
      symbols = 0;
    },
  };
}
