import { createPublicKey, sign, verify, type KeyObject } from 'node:crypto';
import type { LedgerHead } from '#shared/contracts/custody';
import { canonicalText, sha256Hex } from './canonical';

/** A key that signs heads; the private part never leaves the process that loaded it. */
export interface SigningKey {
  readonly keyId: string;
  readonly privateKey: KeyObject;
  /** The raw Ed25519 public key, 64 hexadecimal digits. */
  readonly publicKey: string;
}

/** Raw public keys by key id; every key that ever signed heads here. */
export type PublicKeys = ReadonlyMap<string, string>;

/** First 16 hexadecimal digits of the SHA-256 of the raw public key. */
export const keyIdOf = (publicKey: string): string =>
  sha256Hex(Buffer.from(publicKey, 'hex')).slice(0, 16);

/** The bytes that a head's signature covers: its canonical JSON without `signature`, UTF-8. */
export function signedBytes(head: Omit<LedgerHead, 'signature'>): Buffer {
  const { format, caseNumber, sequence, hash, signedAt, keyId } = head;
  return Buffer.from(canonicalText({ format, caseNumber, sequence, hash, signedAt, keyId }));
}

/** States, signed with Ed25519 (RFC 8032), where a chain stands. */
export function signHead(
  key: SigningKey,
  stand: Pick<LedgerHead, 'caseNumber' | 'sequence' | 'hash' | 'signedAt'>,
): LedgerHead {
  const head = { format: 'centrode.ledger-head/1' as const, ...stand, keyId: key.keyId };
  return { ...head, signature: sign(null, signedBytes(head), key.privateKey).toString('hex') };
}

/** True if the head was signed with the key it names and nothing of it was altered since. */
export function isSignedHead(head: LedgerHead, publicKeys: PublicKeys): boolean {
  const publicKey = publicKeys.get(head.keyId);
  if (publicKey === undefined || keyIdOf(publicKey) !== head.keyId) return false;
  if (!/^[0-9a-f]{128}$/.test(head.signature)) return false;
  return verifySignature(publicKey, signedBytes(head), Buffer.from(head.signature, 'hex'));
}

/** Ed25519 verification against a raw public key (64 hexadecimal digits). */
export function verifySignature(publicKey: string, data: Buffer, signature: Buffer): boolean {
  try {
    const x = Buffer.from(publicKey, 'hex').toString('base64url');
    const key = createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x }, format: 'jwk' });
    return verify(null, data, key, signature);
  } catch {
    return false;
  }
}
