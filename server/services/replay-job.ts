import type { CarrierTables } from '../../shared/fixed-point/tables';
import type { ToleranceCheck } from '../../shared/model/tolerance-check';
import type { CarrierWords } from '../../shared/model/words';
import { replayCheck, type ReplayJob } from '../../shared/replay/job';
import { invalidAt } from '../errors';
import type { StoredRevision } from '../repositories/revisions';

/** What of a revision a replay starts from: its words and tables as they were saved, never worked out again. */
export function jobOf({ design, description, tables }: StoredRevision, check: ToleranceCheck): ReplayJob {
  const words = design.carrier?.words as CarrierWords | undefined;
  if (!words || !tables.carrier) throw invalidAt('/revisionId', 'has no carrier loop to replay');
  const { symbolRateBd, modulation, amplitude } = description.signal;
  return {
    words,
    tables: tables.carrier as CarrierTables,
    symbolRateBd,
    modulation: modulation!,
    amplitude: amplitude!,
    check: replayCheck(check),
  };
}
