import { significantDown, significantUp } from '../math/significant';
import type { Solution } from '../model/design';
import { askedOf } from '../findings/loop-view';
import type { LoopView, StageView } from '../findings/loop-view';
import { nominalBandwidth, setBandwidth } from '../findings/narrower';

/** Digits of what a button types: it keeps the limit, so it is rounded to the safe side. */
const typedDigits = 3;

export type SolutionParts = Pick<Solution, 'slug' | 'title' | 'limit' | 'limitText' | 'sense'> & Partial<Solution>;

export const solution = (view: LoopView, parts: SolutionParts): Solution => ({
  loop: view.key,
  stage: null,
  value: null,
  unit: '',
  present: null,
  note: null,
  estimate: false,
  change: null,
  ...parts,
});

/** A value on the safe side of what just meets a limit. */
export const safe = (value: number, sense: Solution['sense']): number =>
  sense === 'max' ? significantDown(value, typedDigits) : significantUp(value, typedDigits);

/** The edit that gives a stage a bandwidth, in BnT or in the natural frequency that it is described by. */
export const bandwidthChange = (view: StageView, bandwidth: number, sense: Solution['sense']): Solution['change'] =>
  setBandwidth(view, safe((askedOf(view) * bandwidth) / nominalBandwidth(view), sense)).change;
