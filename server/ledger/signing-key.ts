import { createPrivateKey, createPublicKey, generateKeyPairSync, randomUUID } from 'node:crypto';
import type { KeyObject } from 'node:crypto';
import {
  chmodSync,
  existsSync,
  linkSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { keyIdOf, type PublicKeys, type SigningKey } from './head';

const privateName = 'ledger-signing-key.pem';
const publicName = (keyId: string): string => `ledger-${keyId}.pub.pem`;

/**
 * The key that signs ledger heads, kept in a file outside the database and made at first use. To
 * change it, take the private file away: a new key is made, and the public parts of earlier keys
 * stay beside it so that earlier heads can still be checked.
 */
export function openSigningKey(keysDir: string): SigningKey {
  mkdirSync(keysDir, { recursive: true, mode: 0o700 });
  const file = join(keysDir, privateName);
  if (!existsSync(file)) makeKey(keysDir, file);
  const privateKey = createPrivateKey(readFileSync(file));
  const publicPart = createPublicKey(privateKey);
  const publicKey = rawPublicKey(publicPart);
  const keyId = keyIdOf(publicKey);
  const publicFile = join(keysDir, publicName(keyId));
  if (!existsSync(publicFile)) {
    writeFileSync(publicFile, publicPart.export({ type: 'spki', format: 'pem' }), { mode: 0o444 });
  }
  return { keyId, privateKey, publicKey };
}

/** Public parts of all keys that signed heads here. */
export function readPublicKeys(keysDir: string): PublicKeys {
  const names = readdirSync(keysDir).filter((name) => /^ledger-[0-9a-f]{16}\.pub\.pem$/.test(name));
  return new Map(
    names.map((name) => {
      const raw = rawPublicKey(createPublicKey(readFileSync(join(keysDir, name))));
      return [keyIdOf(raw), raw];
    }),
  );
}

/** The public key as other programs read it (SubjectPublicKeyInfo in PEM). */
export const publicKeyPem = (key: SigningKey): string =>
  createPublicKey(key.privateKey).export({ type: 'spki', format: 'pem' }).toString();

/** Written aside and linked, so that of two processes that start together one makes the key. */
function makeKey(keysDir: string, file: string): void {
  const { privateKey } = generateKeyPairSync('ed25519');
  const aside = join(keysDir, `.${randomUUID()}.tmp`);
  writeFileSync(aside, privateKey.export({ type: 'pkcs8', format: 'pem' }), {
    mode: 0o600,
    flush: true,
  });
  chmodSync(aside, 0o600);
  try {
    linkSync(aside, file);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
  } finally {
    rmSync(aside);
  }
}

function rawPublicKey(key: KeyObject): string {
  const { x } = key.export({ format: 'jwk' });
  if (key.asymmetricKeyType !== 'ed25519' || x === undefined) {
    throw new Error('The key of the ledger must be an Ed25519 key.');
  }
  return Buffer.from(x, 'base64url').toString('hex');
}
