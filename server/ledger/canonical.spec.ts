import { describe, expect, it } from '@jest/globals';
import fips180 from '../../test/reference/vectors/sha2_fips180.json' with { type: 'json' };
import jcs from '../../test/reference/vectors/jcs_rfc8785.json' with { type: 'json' };
import { canonicalText, isCanonical, sha256Hex } from './canonical';

/** The double whose IEEE 754 bits are given in hexadecimal. */
const double = (hex: string): number => Buffer.from(hex, 'hex').readDoubleBE();

describe('canonical JSON', () => {
  it.each(jcs.cases)('agrees with the test data of RFC 8785: $name', (vector) => {
    const text = canonicalText(JSON.parse(vector.input_utf8));
    expect(text).toBe(vector.output_utf8);
    expect(sha256Hex(text)).toBe(vector.output_sha256);
    expect(isCanonical(text)).toBe(true);
  });

  it.each(jcs.numbers)('writes $ieee_hex as $expected (RFC 8785, appendix B)', (vector) => {
    expect(canonicalText(double(vector.ieee_hex))).toBe(vector.expected);
  });

  it.each([NaN, Infinity, -Infinity])('refuses %p', (value) => {
    expect(() => canonicalText({ value })).toThrow();
  });

  it.each(['\ud800', 'a\udfff', 'back\\\udbff'])('refuses half a surrogate pair', (value) => {
    expect(() => canonicalText({ value })).toThrow(TypeError);
  });

  it('keeps a backslash before "ud800" apart from half a pair', () => {
    expect(canonicalText('\\ud800')).toBe('"\\\\ud800"');
    expect(canonicalText('😀')).toBe('"😀"');
  });

  it('does not take text with duplicate names, spacing or another order for canonical', () => {
    expect(isCanonical('{"a":1,"a":2}')).toBe(false);
    expect(isCanonical('{"a": 1}')).toBe(false);
    expect(isCanonical('{"b":1,"a":2}')).toBe(false);
    expect(isCanonical('not JSON')).toBe(false);
  });

  it.each(fips180.tests)('hashes "$name" as FIPS 180-4 says', (vector) => {
    const [part, times] = vector.message_repeat ?? [vector.message_utf8 ?? '', 1];
    expect(sha256Hex(String(part).repeat(Number(times)))).toBe(vector.sha256);
  });
});
