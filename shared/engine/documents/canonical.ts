import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import canonicalize from 'canonicalize';
import { EngineError } from '../errors';

/** JSON.stringify writes \ud8… to \udf… for half a surrogate pair only. */
const halfPair = /(?:^|[^\\])(?:\\\\)*\\ud[89a-f]/;

/**
 * Canonical JSON (RFC 8785): the one text of a document, whatever the order of its members.
 * Throws EngineError `not-finite` for what has no such text: NaN, infinities, half a surrogate pair,
 * nothing at all.
 */
export function canonicalText(document: unknown): string {
  const refuse = (): never => {
    throw new EngineError(
      'not-finite',
      'document',
      'The document holds a number that is not finite, or text that is not Unicode.',
    );
  };
  let text: string | undefined;
  try {
    text = canonicalize(document);
  } catch {
    return refuse();
  }
  return text === undefined || halfPair.test(text) ? refuse() : text;
}

/** SHA-256 (FIPS 180-4) of a text in UTF-8, as 64 hexadecimal digits. */
export const sha256Hex = (text: string): string => bytesToHex(sha256(utf8ToBytes(text)));

/** What a document is known by: the SHA-256 of its canonical text. */
export const addressOf = (document: unknown): string => sha256Hex(canonicalText(document));
