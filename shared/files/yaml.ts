import { dump } from 'js-yaml';
import type { ConfigDocument } from '../model/config';
import { wordBitsOf } from '../registers/bits';
import { registerValues } from '../registers/binding';
import { quantitiesOf } from '../registers/quantities';
import { configLoops, configWords } from './config-loops';
import { configQuantity, configRegister } from './config-registers';
import { wrapText } from './c-text';
import { care, type FileInput, type TargetSnapshot } from './file-input';
import { provenance } from './header-head';
import { howToRead } from './how-to-read';
import { stableOrder } from '../stable-order';

const targetOf = ({ registerMap, mapNumber, slug, name, loopClockHz, cPrefix, baseAddress }: TargetSnapshot) => ({
  slug,
  name,
  loopClockHz,
  cPrefix,
  baseAddress,
  mapVersion: mapNumber,
  registerBits: wordBitsOf(registerMap) as 8 | 16 | 32,
  byteOrder: registerMap.byteOrder ?? 'little',
});

/**
 * What config.yaml and config.json hold: shaped by config.schema.json, the same for the same input, integers beyond
 * 2^53 as their digits.
 */
export function configDocument(input: FileInput): ConfigDocument {
  const { product, engine, planName, revision, release, digest, target, design, plan } = input;
  const quantities = quantitiesOf(input);
  return {
    product,
    engine,
    plan: planName,
    revision,
    release,
    digest,
    care,
    target: targetOf(target),
    loops: configLoops(design),
    quantities: quantities.map(configQuantity),
    registers: registerValues(target.registerMap, quantities).map((entry) => configRegister(entry, target)),
    words: stableOrder(configWords(design)),
    description: stableOrder(plan),
  };
}

/** A comment line holds no line break of its own: the names in it come from people. */
const commentLine = (text: string): string => `# ${text.replace(/\p{C}|\u2028|\u2029/gu, ' ')}`.trimEnd();

/** config.yaml: the document as YAML 1.2 below a head that says where it comes from. */
export function configYaml(input: FileInput): string {
  const head = [
    'config.yaml: the words of one plan, the registers that hold them, and what they mean.',
    '',
    ...provenance(input).map(([label, text]) => `${label}: ${text}`),
    '',
    ...howToRead.flatMap((text) => wrapText(text, 96)),
    '',
    ...wrapText(care, 96),
  ].map(commentLine);
  return `${head.join('\n')}\n---\n${dump(configDocument(input), { lineWidth: -1, noRefs: true })}`;
}

/** config.json: the same document as JSON, two spaces deep, with a line break at its end. */
export const configJson = (input: FileInput): string => `${JSON.stringify(configDocument(input), null, 2)}\n`;
