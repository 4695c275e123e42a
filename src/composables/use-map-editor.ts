import { computed, nextTick, ref, shallowRef, watch } from 'vue';
import type { Change } from '../../shared/model/design';
import type { Register } from '../../shared/model/register-map';
import { withValue } from '../../shared/plan/pointer';
import { mapFindings } from '../../shared/registers/map';
import type { Misread } from '../components/target/integer-text';
import * as edits from '../components/target/map-edits';
import type { TargetSheet } from './use-target-sheet';

/** The register that is open, and the edits that the page offers on it. */
export function useMapEditor({ body, editMap }: TargetSheet) {
  const selected = ref(0);
  const misread = shallowRef<ReadonlyMap<string, string>>(new Map());

  const map = computed(() => body.value?.registerMap ?? { registers: [] });
  const register = computed(() => map.value.registers[selected.value]);
  const findings = computed(() => mapFindings(map.value, body.value?.baseAddress));
  const failing = computed(() => findings.value.some(({ severity }) => severity === 'fail'));
  watch(map, ({ registers }) => {
    selected.value = Math.max(0, Math.min(selected.value, registers.length - 1));
  });

  /** Opens a register; on a narrow screen, where it stands below the list, brings it into view. */
  async function go(index: number): Promise<void> {
    selected.value = index;
    await nextTick();
    const heading = document.getElementById('h-B');
    if (window.matchMedia('(max-width: 1180px)').matches) heading?.scrollIntoView();
    heading?.focus({ preventScroll: true });
  }

  function note({ id, sentence }: Misread): void {
    const others = [...misread.value].filter(([key]) => key !== id);
    misread.value = new Map(sentence === undefined ? others : [...others, [id, sentence]]);
  }

  function addRegister(): void {
    editMap(edits.withNewRegister(map.value));
    void go(map.value.registers.length - 1);
  }
  function removeRegister(): void {
    editMap(edits.withoutRegister(map.value, selected.value), `${register.value?.name} is out of the map.`);
  }
  function removeField(at: number): void {
    const name = register.value?.fields[at]?.name;
    editMap(edits.withoutField(map.value, selected.value, at), `${name} is out of ${register.value?.name}.`);
  }
  function move(by: -1 | 1): void {
    const index = selected.value;
    editMap(edits.withMoved(map.value, index, by));
    selected.value = index + by;
  }
  const apply = ({ pointer, value, label }: Change) => editMap(withValue(map.value, pointer, value), `${label}: done.`);
  const change = (edit: Partial<Register>) => editMap(edits.withRegister(map.value, selected.value, edit));
  const changeField = (at: number, edit: edits.FieldChange) =>
    editMap(edits.withField(map.value, selected.value, at, edit));
  const addField = () => editMap(edits.withNewField(map.value, selected.value));

  return {
    ...{ map, selected, register, findings, failing, misread, go, note, apply },
    ...{ addRegister, removeRegister, move, change, addField, removeField, changeField },
  };
}
