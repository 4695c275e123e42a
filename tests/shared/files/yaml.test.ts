import { readdirSync, readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import { load } from 'js-yaml';
import { describe, expect, it } from 'vitest';
import { MapTextError, parseMapText } from '../../../shared/files/map-text';
import { configDocument, configJson, configYaml } from '../../../shared/files/yaml';
import type { Plan } from '../../../shared/model/plan';
import { carrierWords, design, input, plan } from './fixture';
import { written } from './written';

const schemas = new URL('../../../schemas/', import.meta.url);

function configValidator() {
  const ajv = new Ajv2020({ strict: true, strictRequired: false, allErrors: true, allowUnionTypes: true });
  for (const name of readdirSync(schemas).filter((file) => file.endsWith('.schema.json'))) {
    ajv.addSchema(JSON.parse(readFileSync(new URL(name, schemas), 'utf8')) as object);
  }
  return ajv.getSchema('config.schema.json')!;
}

const wide = input({
  planName: '*/ "x": \n---\n- # ζ 東京 🚀',
  design: {
    carrier: {
      ...design.carrier!,
      words: { ...carrierWords, nco: { ...carrierWords.nco, widthBits: 64, fcw: '18446744073709551615' } },
    },
  },
});

const variants = {
  'both loops': input(),
  'a release': input({ release: '2.4.0' }),
  'wide words and a hostile name': wide,
};

describe.each(Object.entries(variants))('config.yaml and config.json of %s', (_, variant) => {
  it('validate against the published schema', () => {
    const validate = configValidator();
    for (const document of [load(configYaml(variant)), JSON.parse(configJson(variant))]) {
      void validate(document);
      expect(validate.errors ?? []).toEqual([]);
    }
  });

  it('hold the same document, and give it back', () => {
    const document: unknown = JSON.parse(JSON.stringify(configDocument(variant)));
    expect(load(configYaml(variant))).toEqual(document);
    expect(JSON.parse(configJson(variant))).toEqual(document);
  });
});

describe('configDocument', () => {
  it('has the words worked out by hand', () => {
    const registers = configDocument(input()).registers.map(({ name, offset, value }) => [
      name,
      Number(offset),
      Number(value),
    ]);
    expect(registers).toEqual(written);
  });

  it('adds the base address to the offsets', () => {
    expect(configDocument(input()).registers[1]).toMatchObject({ offset: '0x00004004', address: '0x40014004' });
  });

  it('keeps the digits of a word beyond 2^53', () => {
    const quantity = configDocument(wide).quantities.find(({ path }) => path === 'carrier.nco.fcw');
    expect(quantity?.value).toBe('18446744073709551615');
    expect(configYaml(wide)).toContain("fcw: '18446744073709551615'");
  });

  it('gives the plan back as it was', () => {
    expect((load(configYaml(input())) as { description: Plan }).description).toEqual(plan);
  });

  it('is the same to the byte whatever the order of the keys', () => {
    const reversed = <T extends object>(value: T): T => Object.fromEntries(Object.entries(value).reverse()) as T;
    const shuffled = input({
      plan: reversed({ ...plan, signal: reversed(plan.signal) }),
      design: { ...design, carrier: { ...design.carrier!, words: reversed(carrierWords) } },
    });
    expect(configYaml(shuffled)).toBe(configYaml(input()));
    expect(configJson(shuffled)).toBe(configJson(input()));
  });

  it('begins with where it comes from', () => {
    const head = configYaml(input()).split('---')[0]!;
    expect(head.split('\n').filter((line) => line !== '' && !line.startsWith('#'))).toEqual([]);
    expect(head).toContain('# Plan: Transponder 17, QPSK 27.5\n# Revision: 14\n# Release: none\n');
    expect(head).toContain('\n# Polarity: the signs of the mantissas carry it already; negate nothing twice.\n');
  });
});

describe('parseMapText', () => {
  it('reads YAML and JSON, hexadecimal offsets included', () => {
    expect(parseMapText('registers:\n  - { name: A, offset: 0x4000, fields: [] }\n')).toEqual({
      registers: [{ name: 'A', offset: 0x4000, fields: [] }],
    });
    expect(parseMapText('{"registers": []}')).toEqual({ registers: [] });
  });

  it('names the line of a fault', () => {
    const fault = expect.objectContaining({ name: 'MapTextError', line: 2 });
    expect(() => parseMapText('registers:\n  - name: "A\n')).toThrow(MapTextError);
    expect(() => parseMapText('registers: []\nbyteOrder: a: b\n')).toThrow(fault);
  });

  it('refuses a text that grows without end', () => {
    const laughs = [
      'a0: &a0 [x, x]',
      ...Array.from({ length: 40 }, (_, i) => `a${i + 1}: &a${i + 1} [*a${i}, *a${i}]`),
    ];
    expect(() => parseMapText(laughs.join('\n'))).toThrow(MapTextError);
  });
});
