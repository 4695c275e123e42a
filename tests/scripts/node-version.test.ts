import { describe, expect, it } from 'vitest';
import packageJson from '../../package.json';
import { checkNodeVersion } from '../../scripts/support/node-version.mjs';

describe('checkNodeVersion', () => {
  it.each(['20.19.0', '20.20.2', '22.0.0'])('accepts %s', (version) => {
    expect(() => checkNodeVersion(version)).not.toThrow();
  });

  it.each(['18.20.4', '20.18.9', '20.9.0'])('refuses %s in one sentence', (version) => {
    const sentence = `Keepstep needs Node.js 20.19 or newer; this is ${version}.`;
    expect(() => checkNodeVersion(version)).toThrow(sentence);
  });

  it('says what package.json says', () => {
    expect(packageJson.engines.node).toBe('>=20.19');
  });
});
