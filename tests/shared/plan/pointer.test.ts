import { describe, expect, it } from 'vitest';
import { keysOf, valueAt, withValue } from '../../../shared/plan/pointer';

// The document and the pointers of RFC 6901, section 5.
const document = { foo: ['bar', 'baz'], '': 0, 'a/b': 1, 'm~n': 8 };

describe('valueAt', () => {
  it.each([
    ['', document],
    ['/foo', ['bar', 'baz']],
    ['/foo/0', 'bar'],
    ['/', 0],
    ['/a~1b', 1],
    ['/m~0n', 8],
    ['/foo/7', undefined],
    ['/foo/0/deeper', undefined],
  ])('reads %s', (pointer, value) => {
    expect(valueAt(document, pointer)).toEqual(value);
  });

  it('sees no key that an object only inherits', () => {
    expect(valueAt({}, '/constructor')).toBeUndefined();
  });
});

describe('withValue', () => {
  const plan = { signal: { rollOff: 0.35 }, carrier: { stages: [{ name: 'acquire' }, { name: 'track' }] } };

  it('replaces one value and leaves the original and the rest alone', () => {
    const changed = withValue(plan, '/carrier/stages/1/name', 'hold');
    expect(changed.carrier.stages.map((stage) => stage.name)).toEqual(['acquire', 'hold']);
    expect(plan.carrier.stages[1]?.name).toBe('track');
    expect(changed.signal).toBe(plan.signal);
  });

  it('makes the objects on the way', () => {
    expect(withValue({}, '/carrier/nco/widthBits', 32)).toEqual({ carrier: { nco: { widthBits: 32 } } });
  });

  it('takes a key away, and an item out of an array', () => {
    expect(withValue(plan, '/signal/rollOff', undefined).signal).toEqual({});
    expect(withValue(plan, '/carrier/stages/0', undefined).carrier.stages).toEqual([{ name: 'track' }]);
  });

  it('undoes the escapes of RFC 6901 in the right order', () => {
    expect(keysOf('/a~01b')).toEqual(['a~1b']);
  });
});
