import { describe, expect, it } from 'vitest';
import { deviceText } from '../../../../src/components/account/device-text';

// Lines as the programs send them; Edge and Chromium also name Safari, Android also names Linux.
describe('deviceText', () => {
  it.each([
    [
      'Mozilla/5.0 (X11; Linux x86_64) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/142.0.0.0 Safari/537.36',
      'Chromium, Linux',
    ],
    [
      'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 Chrome/142.0.0.0 Safari/537.36 Edg/142.0.0.0',
      'Edge, Windows',
    ],
    ['Mozilla/5.0 (Macintosh; Intel Mac OS X 14_5) AppleWebKit/605.1.15 Version/17.5 Safari/605.1.15', 'Safari, macOS'],
    ['Mozilla/5.0 (Android 14; Mobile; rv:128.0) Gecko/128.0 Firefox/128.0', 'Firefox, Android'],
    ['curl/8.5.0', 'curl'],
    ['lab-script', 'lab-script'],
    ['', 'not known'],
  ])('names “%s”', (line, text) => {
    expect(deviceText(line)).toBe(text);
  });
});
