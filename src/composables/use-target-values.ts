import { computed, ref, shallowRef, watch, type Ref } from 'vue';
import type { RegisterMap } from '../../shared/model/register-map';
import { bindingFindings, registerValues, type RegisterValue } from '../../shared/registers/binding';
import { quantitiesOf } from '../../shared/registers/quantities';
import { listPlans, type PlanSummary } from '../api/plans';
import { getRevision, type Revision } from '../api/revisions';
import { useAction } from './use-action';

/** What the newest revision of a chosen plan writes through a map, while the map is edited. */
export function useTargetValues(slug: string, map: Ref<RegisterMap | undefined>) {
  const { error, run } = useAction();
  const plans = shallowRef<PlanSummary[]>([]);
  /** Id of the plan whose words are shown, as text for the choice list; empty for none. */
  const chosen = ref('');
  const revision = shallowRef<Revision>();

  const load = () =>
    run(async () => {
      plans.value = (await listPlans()).filter((plan) => plan.target.slug === slug && plan.head !== null);
      chosen.value = String(plans.value[0]?.id ?? '');
    });

  watch(chosen, (id) => {
    const head = plans.value.find((plan) => String(plan.id) === id)?.head;
    revision.value = undefined;
    if (head) void run(async () => (revision.value = await getRevision(head.id)));
  });

  const quantities = computed(() =>
    revision.value ? quantitiesOf({ plan: revision.value.description, design: revision.value.design }) : undefined,
  );
  const values = computed<RegisterValue[] | undefined>(() =>
    map.value && quantities.value ? registerValues(map.value, quantities.value) : undefined,
  );
  const findings = computed(() => (map.value && quantities.value ? bindingFindings(map.value, quantities.value) : []));
  const name = computed(() => (revision.value ? `r${revision.value.number}` : undefined));
  const stages = computed(() => {
    const { carrier, clock } = revision.value?.design ?? {};
    return [carrier, clock].flatMap((loop) => loop?.stages.map((stage) => stage.name) ?? []);
  });
  return { plans, chosen, revision, values, findings, name, stages, error, load };
}
