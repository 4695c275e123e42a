import { CORE_SCHEMA, load, YAMLException } from 'js-yaml';
import type { Plan } from '../../shared/model/plan';
import { invalid, invalidAt } from '../errors';
import { schemaFaults } from '../schema-faults';
import { validatorOf } from '../schemas';
import { storageFault } from '../storable';
import { completed } from './designs';
import { readQuantities, type Understood } from './yaml-quantities';

const validate = validatorOf('plan');

function parse(yaml: string): unknown {
  try {
    return load(yaml, { schema: CORE_SCHEMA });
  } catch (error) {
    if (!(error instanceof YAMLException)) throw error;
    const line = error.mark ? `line ${error.mark.line + 1}: ` : '';
    throw invalid([{ pointer: '', detail: `is not YAML: ${line}${error.reason}` }], error);
  }
}

/** Aliases make a small text large: what they unfold to must stay as small as a body may be. */
function requireTree(value: unknown): void {
  const seen = new Set<object>();
  const visit = (node: unknown): void => {
    if (typeof node !== 'object' || node === null) return;
    if (seen.has(node)) throw invalidAt('', 'must not use anchors and aliases');
    seen.add(node);
    Object.values(node).forEach(visit);
  };
  visit(value);
}

export interface ReadPlan {
  plan: Plan;
  /** Quantities that were written with their units. */
  understood: Understood[];
}

/**
 * Reads a plan description from YAML 1.2, checks it and fills in its defaults.
 *
 * @throws {AppError} invalid, with a pointer for each fault; of the text itself with an empty pointer and the line
 */
export function planFromYaml(yaml: string): ReadPlan {
  const value = parse(yaml);
  requireTree(value);
  const fault = storageFault(value);
  if (fault) throw invalid([fault]);
  const understood = readQuantities((value ?? {}) as Record<string, unknown>);
  if (!validate(value)) throw invalid(schemaFaults(validate.errors ?? []));
  return { plan: completed(value as Plan), understood };
}
