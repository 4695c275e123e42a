import { describe, expect, it } from 'vitest';
import { stepLastDigit } from '../../../shared/quantities/step';

describe('stepLastDigit', () => {
  it.each([
    ['0.7071', 1, '0.7072'],
    ['0.7071', -10, '0.7061'],
    ['27.5 MBd', 1, '27.6 MBd'],
    ['±70 kHz', 10, '±80 kHz'],
    ['9.9', 1, '10.0'],
    ['0.1', -1, '0.0'],
    ['0.0', -1, '\u22120.1'],
    ['\u22121', 1, '0'],
    ['\u221225', -1, '\u221226'],
    ['10\u202f000', 1, '10001'],
    ['k', 1, 'k'],
  ])('steps %s by %d', (text, steps, expected) => {
    expect(stepLastDigit(text, steps)).toBe(expected);
  });
});
