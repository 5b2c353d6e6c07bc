import { hash } from 'node:crypto';
import canonicalize from 'canonicalize';

// JSON.stringify escapes nothing else in this range: only half a surrogate pair.
const halfPair = /(?:^|[^\\])(?:\\\\)*\\ud[89a-f]/;

/**
 * Canonical JSON (RFC 8785): the one text that an object has. What a signature or a hash covers is
 * this text in UTF-8, kept as it is, so that a later change of a library cannot alter it.
 *
 * Throws for what has no canonical text: NaN and infinities, half a surrogate pair, undefined.
 */
export function canonicalText(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('This value has no canonical JSON text.');
  if (halfPair.test(text)) {
    throw new TypeError(
      'Text with half a surrogate pair has no canonical form (RFC 8785, 3.2.2.2).',
    );
  }
  return text;
}

/** True if the text is the canonical form of what it says (so: no duplicate names, no odd spacing). */
export function isCanonical(text: string): boolean {
  try {
    return canonicalText(JSON.parse(text)) === text;
  } catch {
    return false;
  }
}

/** SHA-256 (FIPS 180-4) of a text in UTF-8 or of bytes, as 64 hexadecimal digits. */
export const sha256Hex = (data: string | Uint8Array): string => hash('sha256', data, 'hex');
