import { describe, expect, it } from 'vitest';
import { nextVersion, versionFault } from '../../../../src/components/releases/next-version';

// Precedence and form: Semantic Versioning 2.0.0, sections 2, 9 and 11.
describe('nextVersion', () => {
  it('raises the minor number of the newest by precedence, not by text', () => {
    expect(nextVersion(['1.9.2', '1.10.0', '1.2.11'])).toBe('1.11.0');
  });

  it('proposes the release that a preview leads to', () => {
    expect(nextVersion(['1.4.0', '1.4.1-rc.1'])).toBe('1.4.1');
  });

  it('begins with 1.0.0', () => {
    expect(nextVersion([])).toBe('1.0.0');
  });
});

describe('versionFault', () => {
  it.each(['2.4.0', '2.4.0-rc.1', '0.1.0'])('takes %s', (version) => {
    expect(versionFault(version, ['2.3.0'])).toBeUndefined();
  });

  it.each(['', '2.4', 'v2.4.0', '2.04.0', ' 2.4.0', '2.4.0+build'])('refuses “%s”', (version) => {
    expect(versionFault(version, [])).toBeDefined();
  });

  it('refuses a version that the target has', () => {
    expect(versionFault('2.3.0', ['2.3.0'])).toBe('2.3.0 exists for this target.');
  });
});
