import type { Plan } from '../model/plan';
import type { RegisterMap } from '../model/register-map';
import type { WorkedLoops } from '../registers/quantities';

/** A target as a revision keeps it, so that its files stay the same when the target changes. */
export interface TargetSnapshot {
  slug: string;
  name: string;
  loopClockHz: number;
  /** Prefix of every C name, in capitals with an underscore at its end. */
  cPrefix: string;
  /** Hexadecimal, `0x40010000`. */
  baseAddress: string;
  registerMap: RegisterMap;
  mapNumber: number;
}

/** All that the files of a revision are made of; the same input gives the same bytes. */
export interface FileInput {
  product: string;
  engine: string;
  /** The plan with its defaults filled in. */
  plan: Plan;
  planName: string;
  revision: number;
  /** SHA-256 of the revision, 64 hexadecimal digits. */
  digest: string;
  /** Version of the release that the file belongs to; null outside a release. */
  release: string | null;
  design: WorkedLoops;
  target: TargetSnapshot;
}

/** What a person must do before the numbers reach the air; in every file. */
export const care =
  'Verify on the real hardware before fielding. Links that carry safety, aviation, maritime or medical traffic ' +
  'need the approvals of their field. Transmitting is governed by local radio regulations and licences, to which ' +
  'Keepstep defers.';
