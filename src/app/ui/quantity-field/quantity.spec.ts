import { describe, expect, it } from '@jest/globals';
import { FormControl } from '@angular/forms';
import { meaningsOfComma, quantity, readQuantity } from './quantity';

describe('a typed quantity', () => {
  it('is read with its unit, in SI', () => {
    const rule = { dimension: 'length', unit: 'm' } as const;
    expect(readQuantity('12.5', rule)).toEqual({ ok: true, value: 12.5 });
    expect(readQuantity('450 mm', rule)).toEqual({ ok: true, value: 0.45 });
    // 3 ft 6 in = 42 in of 25.4 mm.
    const feet = readQuantity(`3'-6"`, rule);
    expect(feet.ok && feet.value).toBeCloseTo(1.0668, 12);
  });

  it('needs its unit where none is meant without it', () => {
    const rule = { dimension: 'length', sign: 'positive' } as const;
    expect(readQuantity('20', rule)).toMatchObject({
      ok: false,
      message: expect.stringMatching(/unit/),
    });
    expect(readQuantity('20 mm', rule)).toEqual({ ok: true, value: 0.02 });
    expect(readQuantity('0 mm', rule)).toEqual({
      ok: false,
      message: 'This must be more than zero.',
    });
  });

  it('may be left empty only where it is optional', () => {
    expect(new FormControl('', quantity({ dimension: 'length', optional: true })).valid).toBe(true);
    expect(new FormControl('', quantity({ dimension: 'length' })).errors).toEqual({
      quantity: 'Type a value.',
    });
  });

  it('with a comma is asked about and never guessed', () => {
    expect(readQuantity('12,5 m', { dimension: 'length' }).ok).toBe(false);
    expect(meaningsOfComma('12,5 m')).toEqual(['12.5 m']);
    expect(meaningsOfComma('1,250 m')).toEqual(['1.250 m', '1250 m']);
    expect(meaningsOfComma('0,250')).toEqual(['0.250']);
    expect(meaningsOfComma('12.5 m')).toEqual([]);
    expect(meaningsOfComma('1,2,3')).toEqual([]);
    expect(meaningsOfComma('1.234,5')).toEqual([]);
  });
});
