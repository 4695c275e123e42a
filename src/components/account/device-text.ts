const browsers: readonly [mark: RegExp, name: string][] = [
  [/Edg\//, 'Edge'],
  [/Firefox\//, 'Firefox'],
  [/Chrome\//, 'Chromium'],
  [/Safari\//, 'Safari'],
  [/curl\//, 'curl'],
];
const systems: readonly [mark: RegExp, name: string][] = [
  [/Android/, 'Android'],
  [/iPhone|iPad/, 'iOS'],
  [/Windows/, 'Windows'],
  [/Mac OS X/, 'macOS'],
  [/Linux/, 'Linux'],
];

/** Program and system of a user-agent line as people name them; the line itself, cut short, when it tells neither. */
export function deviceText(userAgent: string): string {
  const named = [browsers, systems].map((known) => known.find(([mark]) => mark.test(userAgent))?.[1]).filter(Boolean);
  return named.length > 0 ? named.join(', ') : userAgent.slice(0, 60) || 'not known';
}
