import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import {
  addressOf,
  canonicalText,
  compute,
  documentSchemas,
  recompute,
  recomputeReport,
  sha256Hex,
  solveDocument,
} from '#shared/engine/computation/index';
import type { PoseProblem } from '#shared/engine/documents/pose-problem';
import type { PoseSolution } from '#shared/engine/documents/pose-solution';

const vectors = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`./vectors/${name}.json`, import.meta.url), 'utf8'));

interface Canonical {
  readonly cases: readonly {
    readonly name: string;
    readonly input_utf8: string;
    readonly output_utf8: string;
    readonly output_sha256: string;
  }[];
  readonly numbers: readonly { readonly ieee_hex: string; readonly expected: string | null }[];
}
interface Hashes {
  readonly tests: readonly {
    readonly name: string;
    readonly message_utf8?: string;
    readonly message_repeat?: readonly [string, number];
    readonly sha256: string;
  }[];
}

describe('canonical JSON (RFC 8785 and the test data of its author)', () => {
  const jcs = vectors('jcs_rfc8785') as Canonical;
  for (const { name, input_utf8: input, output_utf8: output, output_sha256: hash } of jcs.cases)
    it(name, () => {
      expect(canonicalText(JSON.parse(input))).toBe(output);
      expect(addressOf(JSON.parse(input))).toBe(hash);
    });

  it('writes numbers as appendix B does', () => {
    const finite = jcs.numbers.filter(({ expected }) => expected !== null);
    expect(finite.length).toBeGreaterThan(10);
    for (const { ieee_hex: hex, expected } of finite) {
      const bytes = new DataView(new ArrayBuffer(8));
      bytes.setBigUint64(0, BigInt(`0x${hex}`));
      const value = bytes.getFloat64(0);
      if (Number.isFinite(value)) expect(canonicalText(value)).toBe(expected);
    }
  });

  it('refuses what has no canonical text', () => {
    for (const bad of [NaN, Infinity, undefined, { a: '\ud800' }, { a: '\\\ud800' }])
      expect(() => canonicalText(bad)).toThrow(expect.objectContaining({ code: 'not-finite' }));
    expect(canonicalText({ a: '\\ud800' })).toBe('{"a":"\\\\ud800"}');
  });
});

describe('SHA-256 (FIPS 180-4 examples)', () => {
  for (const test of (vectors('sha2_fips180') as Hashes).tests)
    it(test.name, () => {
      const [letter, times] = test.message_repeat ?? ['', 0];
      expect(sha256Hex(test.message_utf8 ?? letter.repeat(times))).toBe(test.sha256);
    });
});

const problem: PoseProblem = {
  format: 'centrode.pose-problem/1',
  bodies: [
    {
      id: 'car',
      points: { RR: [-1.42, -0.75], LF: { at: [1.31, 0.76], sigma: [0.01, 0.01] }, B: [0.2, 1] },
    },
  ],
  joints: [],
  marks: [
    {
      id: 'm1',
      at: [12.31, 4.02],
      covariance: [
        [4e-4, 0],
        [0, 9e-4],
      ],
      body: 'car',
      point: 'LF',
    },
    {
      id: 'm2',
      at: [9.93, 2.03],
      covariance: [
        [4e-4, 1e-4],
        [1e-4, 4e-4],
      ],
      body: 'car',
      point: 'RR',
    },
    {
      id: 'm3',
      at: [10.83, 3.87],
      covariance: [
        [1e-3, 0],
        [0, 1e-3],
      ],
      body: 'car',
      point: 'B',
    },
  ],
  loss: 'squares',
};

const resultOf = (text: string) => JSON.parse(text) as { result: PoseSolution };

describe('computation record', () => {
  const kept = compute('pose', problem);

  it('is the canonical text, under the hash of it', () => {
    expect(canonicalText(kept.document)).toBe(kept.text);
    expect(addressOf(JSON.parse(kept.text))).toBe(kept.address);
    expect(kept.status).toBe('over-determined');
  });

  it('does not depend on the order in which members are written', () => {
    const [car] = problem.bodies;
    const turned = Object.fromEntries(Object.entries(car.points).reverse());
    const other = compute('pose', { ...problem, bodies: [{ points: turned, id: 'car' }] });
    expect(other.address).toBe(kept.address);
  });

  it('is computed again to the same bytes', () => {
    const again = recompute(JSON.parse(kept.text));
    expect(again.identical).toBe(true);
    expect(again.differences).toEqual([]);
    expect(recomputeReport(kept.text, 'file').exitCode).toBe(0);
  });

  it('shows a changed result, and where', () => {
    const changed = resultOf(kept.text);
    changed.result.bodies['car'].pose.x += 0.001;
    const again = recompute(changed);
    expect(again.identical).toBe(false);
    expect(again.agrees).toBe(false);
    expect(again.differences.map(({ path }) => path)).toEqual(['result.bodies.car.pose.x']);
    const report = recomputeReport(JSON.stringify(changed), 'file');
    expect(report.exitCode).toBe(1);
    expect(report.lines.join('\n')).toContain('result.bodies.car.pose.x');
  });

  it('tells rounding from a difference', () => {
    const rounded = resultOf(kept.text);
    rounded.result.chiSquared *= 1 + 1e-13;
    const again = recompute(rounded);
    expect(again.identical).toBe(false);
    expect(again.agrees).toBe(true);
  });

  it('shows a result with a part missing', () => {
    const cut = resultOf(kept.text);
    cut.result.residuals.pop();
    expect(recompute(cut).agrees).toBe(false);
  });

  it('refuses a file that is none, naming the field', () => {
    expect(recomputeReport('{', 'file').exitCode).toBe(2);
    const { exitCode, lines } = recomputeReport('{"format":"other"}', 'file');
    expect(exitCode).toBe(2);
    expect(lines.join('\n')).toContain('format');
  });

  it('refuses an input that does not follow its schema, naming the field', () => {
    expect(() => compute('pose', { ...problem, marks: [{ id: 'm1' }] })).toThrow(
      expect.objectContaining({ field: expect.stringMatching(/^input\.marks\.0/) }),
    );
  });
});

describe('documents', () => {
  it('are solved by their format', () => {
    expect(solveDocument(problem)).toMatchObject({ format: 'centrode.pose-solution/1' });
    expect(() => solveDocument({ format: 'no/1' })).toThrow(
      expect.objectContaining({ field: 'format' }),
    );
  });

  it('have JSON Schemas', () => {
    const schemas = documentSchemas();
    expect(Object.keys(schemas)).toEqual(
      expect.arrayContaining(['computation', 'pose-problem', 'motion-solution', 'station-answer']),
    );
    for (const schema of Object.values(schemas))
      expect(schema).toMatchObject({ type: 'object', $schema: expect.stringContaining('2020-12') });
  });
});
