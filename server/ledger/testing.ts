import type { LedgerEvent, LedgerHead } from '#shared/contracts/custody';
import { generateKeyPairSync } from 'node:crypto';
import { chainEvent, emptyChain, type ChainPosition } from './chain';
import { keyIdOf, signHead, type SigningKey } from './head';
import { sha256Hex } from './canonical';
import type { FoundFile, LedgerEvidence, LedgerRow } from './verify';

/** Reproducible numbers in [0, 1) for tests that tamper (mulberry32, public domain, from memory). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), state | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export function testKey(): SigningKey {
  const { privateKey } = generateKeyPairSync('ed25519');
  const x = privateKey.export({ format: 'jwk' }).x ?? '';
  const publicKey = Buffer.from(x, 'base64url').toString('hex');
  return { keyId: keyIdOf(publicKey), privateKey, publicKey };
}

export const caseNumber = '2026-014';

/** An invented event; every third takes in a file. */
function eventOf(k: number): Omit<LedgerEvent, 'format' | 'sequence' | 'previous'> {
  const content = `content ${k}`;
  const file = {
    name: `picture ${k}.jpg`,
    size: content.length,
    sha256: sha256Hex(content),
    sha512: sha256Hex(content).repeat(2),
  };
  const takesIn = k % 3 === 0;
  return {
    caseNumber,
    kind: takesIn ? 'file taken in' : 'stored',
    exhibit: `${caseNumber}/${1 + (k % 4)}`,
    recordedAt: `2026-12-01T10:00:${String(k % 60).padStart(2, '0')}.000${String(k).padStart(3, '0')}Z`,
    happenedAt: null,
    zone: 'UTC',
    recordedBy: { id: '0190b8c4-0000-7000-8000-000000000001', name: 'Ines Farrow' },
    releasedBy: null,
    receivedBy: null,
    purpose: '',
    condition: 'as received',
    sealBefore: 'S-100',
    sealAfter: 'S-100',
    location: `shelf ${k}`,
    method: 'none',
    tracking: '',
    note: `note ${k}`,
    files: takesIn ? [file] : [],
    refersTo: null,
  };
}

/** An untouched ledger with a signed head at every `headEvery`-th event and at the last. */
export function ledgerOf(count: number, key: SigningKey, headEvery = 1): Required<LedgerEvidence> {
  const rows: LedgerRow[] = [];
  const heads: LedgerHead[] = [];
  const files = new Map<string, FoundFile | null>();
  let position: ChainPosition = emptyChain;
  for (let k = 1; k <= count; k++) {
    const { event, text, hash } = chainEvent(eventOf(k), position);
    position = { sequence: k, hash };
    rows.push({ place: k, text, hash, columns: columnsOf(event) });
    for (const file of event.files) files.set(file.sha256, { ...file });
    if (k % headEvery === 0 || k === count) {
      heads.push(signHead(key, { caseNumber, sequence: k, hash, signedAt: event.recordedAt }));
    }
  }
  return {
    caseNumber,
    rows,
    heads,
    publicKeys: new Map([[key.keyId, key.publicKey]]),
    headEvery,
    files,
  };
}

export const columnsOf = ({ kind, previous, exhibit }: LedgerEvent) => ({
  kind,
  previous,
  exhibit,
});
