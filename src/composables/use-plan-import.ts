import { ref } from 'vue';
import { useRouter } from 'vue-router';
import { fieldOf } from '../../shared/plan/fields';
import { readYaml, type DraftPlan, type Understood } from '../api/plans';
import { examplePlan } from '../components/plans/example-plan';
import { announce, useAction } from './use-action';

/** Where a description waits for the form of a new plan, as JSON: `{ plan }`. */
export const importKey = 'keepstep.import';

/** Has the server check an uploaded description and opens it in the form of a new plan. Nothing is stored yet. */
export function usePlanImport() {
  const { busy, error, run } = useAction();
  const router = useRouter();
  const fileName = ref('');

  async function take(file: File): Promise<void> {
    fileName.value = file.name;
    const read = await run(async () => readYaml(await file.text()));
    if (!read) return;
    await open(read.plan);
    if (read.understood.length > 0) announce(understoodText(read.understood));
  }

  async function open(plan: DraftPlan): Promise<void> {
    sessionStorage.setItem(importKey, JSON.stringify({ plan }));
    await router.push({ name: 'new-plan' });
  }

  /** Opens the worked example on a target, as a plan that has yet to be saved. */
  const openExample = (target: string) => open(examplePlan(target));

  return { busy, error, fileName, take, openExample };
}

/** “Understood: 1.2 Symbol rate: 1.2 MBd; 4.2 Tolerance, each end: ±20 ppm.” */
export function understoodText(understood: readonly Understood[]): string {
  const parts = understood.map(({ pointer, text }) => {
    const field = fieldOf(pointer);
    return `${field ? `${field.no} ${field.label}` : pointer}: ${text}`;
  });
  return `Understood: ${parts.join('; ')}.`;
}
