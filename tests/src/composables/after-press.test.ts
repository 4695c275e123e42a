import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { afterPress } from '../../../src/composables/after-press';

const point = (type: string) => document.dispatchEvent(new Event(type));

describe('afterPress', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => {
    point('pointerup');
    vi.useRealTimers();
  });

  it('does not wait when no pointer is down', () => {
    const work = vi.fn();
    afterPress(work);
    expect(work).toHaveBeenCalledOnce();
  });

  it.each(['pointerup', 'pointercancel'])('waits until %s and what it sets off are through', (end) => {
    const work = vi.fn();
    point('pointerdown');
    afterPress(work);
    point(end);
    expect(work).not.toHaveBeenCalled();
    vi.runAllTimers();
    point('pointerup');
    vi.runAllTimers();
    expect(work).toHaveBeenCalledOnce();
  });
});
