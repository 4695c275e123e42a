import { dump } from 'js-yaml';
import { ref } from 'vue';
import { MapTextError, parseMapText } from '../../shared/files/map-text';
import { asRegisterMap } from '../../shared/registers/map-shape';
import { saveFile } from '../api/client';
import type { TargetSheet } from './use-target-sheet';

/** The register map of a target as a file: taken into the edits, or given out. The server checks it when it is saved. */
export function useMapFiles({ body, base, editMap }: TargetSheet) {
  /** Why the last file was not taken. */
  const refusal = ref<string>();

  function take(text: string, fileName: string): void {
    refusal.value = undefined;
    try {
      const map = asRegisterMap(parseMapText(text));
      if (typeof map === 'string') refusal.value = `${fileName} is not taken. ${map}`;
      else editMap(map, `The map is that of ${fileName} now.`);
    } catch (error) {
      if (!(error instanceof MapTextError)) throw error;
      refusal.value = `${fileName} is neither YAML nor JSON. ${error.message}`;
    }
  }

  function download(): void {
    if (!body.value || !base.value) return;
    const { slug, registerMap } = body.value;
    saveFile(`${slug}-map-${base.value.mapNumber}.yaml`, dump(registerMap, { noRefs: true, lineWidth: -1 }));
  }

  return { refusal, take, download };
}
