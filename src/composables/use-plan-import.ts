import { ref } from 'vue';
import { useRouter } from 'vue-router';
import { readYaml, type DraftPlan } from '../api/plans';
import { examplePlan } from '../components/plans/example-plan';
import { useAction } from './use-action';

/** Where a description waits for the form of a new plan, as JSON: `{ plan }`. */
export const importKey = 'keepstep.import';

/** Has the server check an uploaded description and opens it in the form of a new plan. Nothing is stored yet. */
export function usePlanImport() {
  const { busy, error, run } = useAction();
  const router = useRouter();
  const fileName = ref('');

  async function take(file: File): Promise<void> {
    fileName.value = file.name;
    const plan = await run(async () => readYaml(await file.text()));
    if (plan) await open(plan);
  }

  async function open(plan: DraftPlan): Promise<void> {
    sessionStorage.setItem(importKey, JSON.stringify({ plan }));
    await router.push({ name: 'new-plan' });
  }

  /** Opens the worked example on a target, as a plan that has yet to be saved. */
  const openExample = (target: string) => open(examplePlan(target));

  return { busy, error, fileName, take, openExample };
}
