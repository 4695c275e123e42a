// Generated from schemas/plan-yaml.schema.json; do not edit.

/**
 * A plan description in YAML, to be checked and completed.
 */
export interface PlanYaml {
  /**
   * YAML 1.2 text.
   */
  yaml: string;
}
