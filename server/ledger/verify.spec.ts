import { describe, expect, it } from '@jest/globals';
import type { LedgerEvent, LedgerFinding } from '#shared/contracts/custody';
import { canonicalText, sha256Hex } from './canonical';
import { signHead } from './head';
import { caseNumber, columnsOf, ledgerOf, seeded, testKey } from './testing';
import { verifyLedger, type LedgerEvidence, type LedgerRow } from './verify';

const key = testKey();
const stranger = testKey();
const count = 30;

interface Tampered {
  readonly evidence: LedgerEvidence;
  /** What must be found, as "code sequence"; a set, for the order does not matter. */
  readonly expected: readonly string[];
}

type Ledger = ReturnType<typeof ledgerOf>;
type Tamper = (ledger: Ledger, pick: (below: number) => number) => Tampered;

const eventIn = (row: LedgerRow): LedgerEvent => JSON.parse(row.text ?? '') as LedgerEvent;

/** The row as somebody would write it who knows how rows are made. */
function rewritten(row: LedgerRow, change: Partial<LedgerEvent>): LedgerRow {
  const event = { ...eventIn(row), ...change };
  const text = canonicalText(event);
  return { ...row, text, hash: sha256Hex(text), columns: columnsOf(event) };
}

/** Every row from `from` on, chained anew after the one before it. */
function rechained(rows: readonly LedgerRow[], from: number): LedgerRow[] {
  const result = rows.slice(0, from);
  for (const row of rows.slice(from)) {
    const previous = result.at(-1)?.hash ?? '0'.repeat(64);
    const sequence = result.length + 1;
    result.push({ ...rewritten(row, { previous, sequence }), place: sequence });
  }
  return result;
}

const replaced = (rows: readonly LedgerRow[], index: number, row: LedgerRow): LedgerRow[] =>
  rows.map((each, i) => (i === index ? row : each));

const names = (code: LedgerFinding['code'], from: number, to = from): string[] =>
  Array.from({ length: to - from + 1 }, (_, i) => `${code} ${from + i}`);

const edits: Partial<LedgerEvent>[] = [
  { note: 'something else' },
  { location: 'another shelf' },
  { receivedBy: 'somebody' },
  { recordedAt: '2026-12-01T09:59:59.999999Z' },
  { recordedBy: { id: 'x', name: 'somebody else' } },
  { exhibit: `${caseNumber}/99` },
  { previous: 'f'.repeat(64) },
];

const tampers: Record<string, Tamper> = {
  'an edit, its hash left as it was': (ledger, pick) => {
    const i = pick(count);
    const { text } = rewritten(ledger.rows[i], edits[pick(edits.length)]);
    const rows = replaced(ledger.rows, i, { ...ledger.rows[i], text });
    return { evidence: { ...ledger, rows }, expected: [`changed ${i + 1}`, mismatch(i + 1)] };
  },
  'an edit, hashed anew': (ledger, pick) => {
    const i = pick(count);
    const rows = replaced(ledger.rows, i, rewritten(ledger.rows[i], edits[pick(edits.length)]));
    return { evidence: { ...ledger, rows }, expected: [`changed ${i + 1}`, mismatch(i + 1)] };
  },
  'an edit, the whole tail hashed anew': (ledger, pick) => {
    const i = pick(count);
    const edited = replaced(ledger.rows, i, rewritten(ledger.rows[i], { note: 'else' }));
    const rows = rechained(edited, i);
    return {
      evidence: { ...ledger, rows },
      expected: [...names('changed', i + 1, count), mismatch(count)],
    };
  },
  'an edit, the tail hashed anew and signed with another key': (ledger, pick) => {
    const i = pick(count);
    const edited = replaced(ledger.rows, i, rewritten(ledger.rows[i], { note: 'else' }));
    const rows = rechained(edited, i);
    const heads = ledger.heads.map((head, j) =>
      j < i ? head : signHead(stranger, { ...head, hash: rows[j].hash }),
    );
    return {
      evidence: { ...ledger, rows, heads },
      expected: [
        ...names('bad-signature', i + 1, count),
        ...(i === 0 ? ['head-mismatch null'] : names('inserted', i + 1, count)),
      ],
    };
  },
  'one byte of the text': (ledger, pick) => {
    const i = pick(count);
    const bytes = Buffer.from(ledger.rows[i].text ?? '');
    const at = pick(bytes.length);
    bytes[at] ^= 1 + pick(30);
    const rows = replaced(ledger.rows, i, { ...ledger.rows[i], text: bytes.toString() });
    return { evidence: { ...ledger, rows }, expected: [`altered ${i + 1}`, mismatch(i + 1)] };
  },
  'the stored hash': (ledger, pick) => {
    const i = pick(count);
    const hash = sha256Hex(String(pick(1e9)));
    const rows = replaced(ledger.rows, i, { ...ledger.rows[i], hash });
    return { evidence: { ...ledger, rows }, expected: names('changed', i + 1) };
  },
  'a column': (ledger, pick) => {
    const i = pick(count);
    const row = ledger.rows[i];
    const rows = replaced(ledger.rows, i, { ...row, columns: { ...row.columns, kind: 'sealed' } });
    return { evidence: { ...ledger, rows }, expected: names('columns-differ', i + 1) };
  },
  'a removal': (ledger, pick) => {
    const i = pick(count);
    const rows = ledger.rows.filter((_, j) => j !== i);
    return { evidence: { ...ledger, rows }, expected: [`missing ${i + 1}`, mismatch(i + 1)] };
  },
  'a removal, later rows moved up': (ledger, pick) => {
    const i = pick(count);
    const rows = ledger.rows.filter((_, j) => j !== i).map((row, j) => ({ ...row, place: j + 1 }));
    return {
      evidence: { ...ledger, rows },
      expected: [`missing ${i + 1}`, mismatch(i + 1), ...names('columns-differ', i + 2, count)],
    };
  },
  'a removal, the tail hashed anew': (ledger, pick) => {
    const i = pick(count);
    const rows = rechained(
      ledger.rows.filter((_, j) => j !== i),
      i,
    );
    return {
      evidence: { ...ledger, rows },
      expected: [...names('changed', i + 1, count - 1), `missing ${count}`, mismatch(count)],
    };
  },
  'the tail cut off': (ledger, pick) => {
    const left = pick(count);
    return {
      evidence: { ...ledger, rows: ledger.rows.slice(0, left) },
      expected: [...names('missing', left + 1, count), mismatch(count)],
    };
  },
  'an insertion, later rows moved down': (ledger, pick) => {
    const i = pick(count);
    const forged = rewritten(ledger.rows[i], { note: 'never happened' });
    const rows = [...ledger.rows.slice(0, i + 1), forged, ...ledger.rows.slice(i + 1)].map(
      (row, j) => ({ ...row, place: j + 1 }),
    );
    return {
      evidence: { ...ledger, rows },
      expected: [...names('inserted', i + 2), ...names('columns-differ', i + 2, count)],
    };
  },
  'a copy at the end': (ledger, pick) => {
    const rows = [...ledger.rows, { ...ledger.rows[pick(count)], place: count + 1 }];
    return { evidence: { ...ledger, rows }, expected: names('inserted', count + 1) };
  },
  'an event added at the end and chained': (ledger) => {
    const rows = rechained([...ledger.rows, ledger.rows[count - 1]], count);
    return { evidence: { ...ledger, rows }, expected: names('inserted', count + 1) };
  },
  'two rows swapped': (ledger, pick) => {
    const i = pick(count - 1);
    const j = i + 1 + pick(count - 1 - i);
    const rows = replaced(replaced(ledger.rows, i, { ...ledger.rows[j], place: i + 1 }), j, {
      ...ledger.rows[i],
      place: j + 1,
    });
    return {
      evidence: { ...ledger, rows },
      expected: [i, j].flatMap((k) => [
        ...names('reordered', k + 1),
        ...names('columns-differ', k + 1),
      ]),
    };
  },
  'a head altered': (ledger, pick) => {
    const i = pick(count);
    const heads = ledger.heads.map((head, j) =>
      j === i ? { ...head, signedAt: '2026-12-01T00:00:00.000000Z' } : head,
    );
    const expected = names('bad-signature', i + 1);
    if (i === count - 1) expected.push(...names('inserted', count));
    return { evidence: { ...ledger, heads }, expected };
  },
  'all heads removed': (ledger) => ({
    evidence: { ...ledger, heads: [] },
    expected: ['head-mismatch null'],
  }),
  'a stored file changed': (ledger, pick) => {
    const k = 3 * (1 + pick(count / 3));
    const file = eventIn(ledger.rows[k - 1]).files[0];
    const found = { ...file, sha512: 'e'.repeat(128) };
    const files = new Map(ledger.files).set(file.sha256, found);
    return { evidence: { ...ledger, files }, expected: names('file-changed', k) };
  },
  'a stored file removed': (ledger, pick) => {
    const k = 3 * (1 + pick(count / 3));
    const files = new Map(ledger.files).set(eventIn(ledger.rows[k - 1]).files[0].sha256, null);
    return { evidence: { ...ledger, files }, expected: names('file-missing', k) };
  },
};

const mismatch = (k: number): string => `head-mismatch ${k}`;

/** A text with one byte changed may still be an event, or be none: both name the event. */
const coarse = (name: string): string => name.replace(/^(changed|malformed) /, 'altered ');

/** An altered event may also name a file that never was; the event is named, and that is what counts. */
const withoutEcho = (list: readonly string[]): string[] =>
  list.filter(
    (name) =>
      !list.includes(name.replace(/^file-(missing|changed)/, 'altered')) ||
      !name.startsWith('file-'),
  );

const found = (evidence: LedgerEvidence): string[] =>
  verifyLedger(evidence).map(({ code, sequence }) => `${code} ${sequence}`);

const sorted = (list: readonly string[]): string[] =>
  withoutEcho([...new Set(list.map(coarse))].sort());

describe('the verifier', () => {
  it('finds nothing in a ledger as it was written', () => {
    expect(found(ledgerOf(count, key))).toEqual([]);
    expect(found(ledgerOf(count, key, 8))).toEqual([]);
    expect(found(ledgerOf(0, key))).toEqual([]);
  });

  it.each(Object.keys(tampers))('names %s, and nothing else (30 seeded runs)', (name) => {
    const ledger = ledgerOf(count, key);
    for (let seed = 1; seed <= 30; seed++) {
      const random = seeded(seed);
      const { evidence, expected } = tampers[name](ledger, (below) => Math.floor(random() * below));
      expect({ seed, found: sorted(found(evidence)) }).toEqual({ seed, found: sorted(expected) });
    }
  });

  it('names both of two changes made at once (200 seeded pairs of edits and removals)', () => {
    const ledger = ledgerOf(count, key);
    for (let seed = 1; seed <= 200; seed++) {
      const random = seeded(1000 + seed);
      const pick = (below: number): number => Math.floor(random() * below);
      const i = pick(count);
      const j = (i + 1 + pick(count - 1)) % count;
      const edited = rewritten(ledger.rows[i], edits[pick(edits.length)]);
      const rows = replaced(ledger.rows, i, edited).filter((_, index) => index !== j);
      expect(found({ ...ledger, rows })).toEqual(
        expect.arrayContaining([`changed ${i + 1}`, `missing ${j + 1}`]),
      );
    }
  });

  it('says that a tail hashed anew between rare heads is not as signed, and where', () => {
    const ledger = ledgerOf(count, key, 10);
    const edited = replaced(ledger.rows, 13, rewritten(ledger.rows[13], { note: 'else' }));
    const findings = verifyLedger({ ...ledger, rows: rechained(edited, 13) });
    const codes = findings.map(({ code, sequence }) => `${code} ${sequence}`);
    expect(codes).toEqual(expect.arrayContaining(['changed 20', 'changed 30', 'head-mismatch 30']));
  });

  it('accepts a withheld event by its hash alone and refuses a wrong one', () => {
    const ledger = ledgerOf(count, key);
    const withheld = (i: number, hash: string): LedgerRow => ({ place: i + 1, text: null, hash });
    const shown = replaced(ledger.rows, 4, withheld(4, ledger.rows[4].hash));
    expect(found({ ...ledger, rows: shown })).toEqual([]);
    const wrong = replaced(ledger.rows, 4, withheld(4, 'a'.repeat(64)));
    expect(sorted(found({ ...ledger, rows: wrong }))).toEqual(['altered 5', mismatch(5)]);
  });

  it('does not take an event of another case, even with a right hash', () => {
    const ledger = ledgerOf(count, key);
    const other = replaced(ledger.rows, 2, rewritten(ledger.rows[2], { caseNumber: '2026-015' }));
    expect(found({ ...ledger, rows: other })).toEqual(expect.arrayContaining(['malformed 3']));
  });

  it('is not led astray by a claim of an absurd sequence', () => {
    const ledger = ledgerOf(count, key);
    const forged = { ...rewritten(ledger.rows[0], { sequence: 2 ** 52 }), place: count + 1 };
    expect(found({ ...ledger, rows: [...ledger.rows, forged] })).toEqual([`inserted ${count + 1}`]);
  });

  it('when the ledger was set back and continued, then two signed heads give it away', () => {
    const ledger = ledgerOf(count, key);
    const rows = rechained(
      replaced(ledger.rows, 25, rewritten(ledger.rows[25], { note: 'x' })),
      25,
    );
    const again = rows
      .slice(25)
      .map(({ place, hash }) => signHead(key, { ...ledger.heads[0], sequence: place, hash }));
    expect(found({ ...ledger, rows, heads: [...ledger.heads, ...again] })).toEqual(
      expect.arrayContaining([26, 27, 28, 29, 30].map(mismatch)),
    );
  });
});
