export type State = 'pass' | 'caution' | 'fail' | 'waived' | 'undecided' | 'none' | 'running';

export const words: Readonly<Record<State, string>> = {
  pass: 'pass',
  caution: 'caution',
  fail: 'fail',
  waived: 'waived',
  undecided: 'undecided',
  none: 'not run',
  running: 'running',
};

interface Shape {
  tag: string;
  attrs: Record<string, string | number>;
}

const line = { fill: 'none', stroke: 'currentColor', 'stroke-width': 1.5 };
const path = (d: string, attrs: Shape['attrs'] = line): Shape => ({ tag: 'path', attrs: { d, ...attrs } });
const ring = (attrs: Shape['attrs'] = {}): Shape => ({
  tag: 'circle',
  attrs: { cx: 7, cy: 7, r: 5.6, ...line, ...attrs },
});

/** Shape says the state as well as the word and the colour do: pass and fail part in grey, too. */
export const shapes: Readonly<Record<State, readonly Shape[]>> = {
  pass: [ring(), path('M4.4 7.2l1.9 1.9 3.4-4')],
  caution: [path('M7 1.4L13.2 12.4H.8z', { ...line, 'stroke-linejoin': 'round' }), path('M7 5.2v3.6M7 9.9v1.2')],
  fail: [
    path('M1 1h12v12H1z', { fill: 'currentColor' }),
    path('M4.2 4.2l5.6 5.6M9.8 4.2l-5.6 5.6', { stroke: 'var(--paper)', 'stroke-width': 1.7 }),
  ],
  waived: [path('M7 .9L13.1 7 7 13.1.9 7z'), path('M4.4 7h5.2')],
  undecided: [path('M1.4 1.4h11.2v11.2H1.4z', { ...line, 'stroke-dasharray': '2.6 2' }), path('M4 7h6')],
  none: [ring({ 'stroke-dasharray': '2.2 2.2' })],
  running: [ring({ 'stroke-width': 1.2 }), path('M7 7V1.4A5.6 5.6 0 0 1 12.6 7z', { fill: 'currentColor' })],
};
