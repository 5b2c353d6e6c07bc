import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from '@jest/globals';
import rfc8032 from '../../test/reference/vectors/ed25519_rfc8032.json' with { type: 'json' };
import wycheproof from '../../test/reference/vectors/ed25519_wycheproof.json' with { type: 'json' };
import { isSignedHead, keyIdOf, signHead, signedBytes, verifySignature } from './head';
import { openSigningKey, publicKeyPem, readPublicKeys } from './signing-key';

const folder = mkdtempSync(join(tmpdir(), 'ledger-head-'));
afterAll(() => rmSync(folder, { recursive: true }));

const bytes = (hex: string): Buffer => Buffer.from(hex, 'hex');
const stand = {
  caseNumber: '2026-014',
  sequence: 7,
  hash: 'ab'.repeat(32),
  signedAt: '2026-12-01T12:00:00.000001Z',
};

describe('Ed25519', () => {
  it.each(rfc8032.tests)('accepts $name of RFC 8032, section 7.1', (vector) => {
    const { public_hex, message_hex, signature_hex } = vector;
    expect(verifySignature(public_hex, bytes(message_hex), bytes(signature_hex))).toBe(true);
    const altered = bytes(signature_hex);
    altered[5] ^= 1;
    expect(verifySignature(public_hex, bytes(message_hex), altered)).toBe(false);
  });

  it('judges the 151 Wycheproof signatures as stated, malleable ones included', () => {
    const wrong = wycheproof.tests.filter(
      ({ pk, msg, sig, result }) =>
        verifySignature(pk, bytes(msg), bytes(sig)) !== (result === 'valid'),
    );
    expect(wycheproof.tests).toHaveLength(151);
    expect(wrong).toEqual([]);
  });
});

describe('a signed head', () => {
  const keys = join(folder, 'keys');
  const key = openSigningKey(keys);

  it('is accepted as it was signed and refused when any field is altered', () => {
    const head = signHead(key, stand);
    const publicKeys = readPublicKeys(keys);
    expect(isSignedHead(head, publicKeys)).toBe(true);
    expect(isSignedHead({ ...head, sequence: 6 }, publicKeys)).toBe(false);
    expect(isSignedHead({ ...head, hash: 'ac'.repeat(32) }, publicKeys)).toBe(false);
    expect(isSignedHead({ ...head, caseNumber: '2026-015' }, publicKeys)).toBe(false);
    expect(isSignedHead({ ...head, signedAt: '2026-12-02T12:00:00Z' }, publicKeys)).toBe(false);
    expect(isSignedHead({ ...head, signature: '' }, publicKeys)).toBe(false);
    expect(isSignedHead(head, new Map())).toBe(false);
  });

  it('is not accepted from a key filed under a key id that is not its own', () => {
    const other = openSigningKey(join(folder, 'other'));
    const head = signHead({ ...other, keyId: key.keyId }, stand);
    expect(isSignedHead(head, new Map([[key.keyId, other.publicKey]]))).toBe(false);
  });

  it('verifies with openssl, none of our code taking part', () => {
    const head = signHead(key, stand);
    const file = (name: string, data: string | Buffer): string => {
      writeFileSync(join(folder, name), data);
      return join(folder, name);
    };
    const verify = (data: Buffer): string =>
      execFileSync('openssl', [
        ...['pkeyutl', '-verify', '-pubin', '-rawin'],
        ...['-inkey', file('public.pem', publicKeyPem(key))],
        ...['-sigfile', file('signature.bin', bytes(head.signature))],
        ...['-in', file('head.json', data)],
      ]).toString();
    expect(verify(signedBytes(head))).toContain('Signature Verified Successfully');
    expect(() => verify(signedBytes({ ...head, sequence: 8 }))).toThrow();
  });
});

describe('the signing key', () => {
  it('is made once, readable to its owner alone, and named by its public part', () => {
    const keys = join(folder, 'once');
    const first = openSigningKey(keys);
    const second = openSigningKey(keys);
    expect(second.publicKey).toBe(first.publicKey);
    expect(statSync(join(keys, 'ledger-signing-key.pem')).mode & 0o777).toBe(0o600);
    const expected = createHash('sha256').update(bytes(first.publicKey)).digest('hex').slice(0, 16);
    expect(first.keyId).toBe(expected);
    expect(keyIdOf(first.publicKey)).toBe(expected);
    expect(readdirSync(keys)).toHaveLength(2);
  });

  it('when it is replaced, then heads of the earlier key can still be checked', () => {
    const keys = join(folder, 'replaced');
    const earlier = signHead(openSigningKey(keys), stand);
    rmSync(join(keys, 'ledger-signing-key.pem'));
    const later = signHead(openSigningKey(keys), stand);
    expect(later.keyId).not.toBe(earlier.keyId);
    const publicKeys = readPublicKeys(keys);
    expect([earlier, later].map((head) => isSignedHead(head, publicKeys))).toEqual([true, true]);
  });
});
