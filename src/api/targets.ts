import type { RegisterMap } from '../../shared/model/register-map';
import type { TargetBody } from '../../shared/model/target';
import { api } from './client';
import { everyPage } from './pages';

export interface TargetSummary {
  slug: string;
  name: string;
  loopClockHz: number;
  /** Prefix of every C name: `CVD_`. */
  cPrefix: string;
  /** Hexadecimal, `0x40010000`. */
  baseAddress: string;
  /** Number of the register map; each change of the map takes the next one. */
  mapNumber: number;
  planCount: number;
  newestRelease: { version: string; state: string } | null;
  version: number;
}

export interface TargetDetail extends TargetSummary {
  registerMap: RegisterMap;
}

export const listTargets = (): Promise<TargetSummary[]> => everyPage<TargetSummary>('/targets');

export const getTarget = (slug: string): Promise<TargetDetail> =>
  api.get<TargetDetail>(`/targets/${encodeURIComponent(slug)}`);

export const createTarget = (target: TargetBody): Promise<TargetDetail> => api.post<TargetDetail>('/targets', target);

/**
 * Writes a target over the version that was read; a changed register map gets the next map number.
 *
 * @param version rejects with 412 when somebody else has saved since
 */
export const saveTarget = (version: number, target: TargetBody): Promise<TargetDetail> =>
  api.put<TargetDetail>(`/targets/${encodeURIComponent(target.slug)}`, target, { ifMatch: `"${version}"` });
