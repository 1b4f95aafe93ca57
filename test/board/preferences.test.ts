import { describe, expect, it } from 'vitest';
import { Preferences } from '../../src/board/state/preferences.svelte.ts';

/** A storage as a browser has it, as far as it is used. */
function storage(first: string | null): Storage {
  let text = first;
  const kept: Pick<Storage, 'getItem' | 'setItem'> = {
    getItem: () => text,
    setItem: (_, value) => {
      text = value;
    },
  };
  return kept as Storage;
}

describe('Preferences', () => {
  it('remembers choices between visits', () => {
    const kept = storage(null);
    const first = new Preferences(kept);
    first.speed = 'kt';
    first.field = 'shear';
    first.ranges = { speed: { low: 0, high: 40 } };
    first.remember();
    const second = new Preferences(kept);
    expect([second.speed, second.field, second.ranges]).toEqual(['kt', 'shear', { speed: { low: 0, high: 40 } }]);
  });

  it('takes a site file’s units on the first visit only', () => {
    const kept = storage(null);
    const first = new Preferences(kept);
    first.suggest({ speed: 'kt', height: 'ft' });
    expect(first.units).toEqual({ speed: 'kt', height: 'ft' });
    first.remember();
    const second = new Preferences(kept);
    second.suggest({ speed: 'm/s', height: 'm' });
    expect(second.units).toEqual({ speed: 'kt', height: 'ft' });
  });

  it('passes over what no longer means anything', () => {
    const spoiled = JSON.stringify({
      speed: 'furlongs',
      field: 7,
      ceiling: -3,
      hubHeight: 'high',
      ranges: { speed: { low: 5, high: 1 }, gone: { low: 0, high: 1 }, shear: null },
    });
    for (const text of [spoiled, 'no JSON', '"text"', 'null']) {
      const { speed, field, ceiling, hubHeight, ranges } = new Preferences(storage(text));
      expect([speed, field, ceiling, hubHeight, ranges]).toEqual(['m/s', 'speed', 0, 100, {}]);
    }
  });

  it('works without a storage, and with one that refuses', () => {
    new Preferences(undefined).remember();
    const refusing = {
      getItem: () => null,
      setItem: () => {
        throw new Error('full');
      },
    } as unknown as Storage;
    expect(() => new Preferences(refusing).remember()).not.toThrow();
  });
});
