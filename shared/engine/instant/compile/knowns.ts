import type { Known, MotionProblem, VectorKnown } from '../../documents/motion-problem';
import { EngineError } from '../../errors';
import type { KnownPart, Level, ModelJoint, ModelKnown, Place } from '../model';
import { pairNoises } from '../noise';
import type { References } from './joints';
import type { Layout } from './layout';

export const compileKnowns = (
  problem: MotionProblem,
  joints: readonly ModelJoint[],
  layout: Layout,
  references: References,
): ModelKnown[] =>
  problem.knowns.flatMap((k, index) => {
    const field = `knowns.${k.id}`;
    if (k.quantity === 'velocity' || k.quantity === 'acceleration')
      return compileVector(k, index, field, layout, references);
    return [compileScalar(k, index, field, joints, layout, references)];
  });

const compileScalar = (
  k: Exclude<Known, VectorKnown>,
  index: number,
  field: string,
  joints: readonly ModelJoint[],
  layout: Layout,
  references: References,
): ModelKnown => {
  const valueAt = layout.linear(k.value);
  layout.uncertain('known', k.id, valueAt, k.sigma, `${field}.sigma`);
  const level: Level =
    k.quantity === 'angular-velocity' || k.quantity === 'slide-rate' || k.quantity === 'link-rate'
      ? 'velocity'
      : 'acceleration';
  const parts: KnownPart[] = [{ part: 'value', at: valueAt }];
  const common = { id: k.id, index, level, parts, valueAt };
  if ('body' in k)
    return { ...common, kind: 'angular', body: references.body(k.body, `${field}.body`) };
  const joint = joints.find((j) => j.id === k.joint);
  const wanted = k.quantity.startsWith('link') ? ['link'] : ['path', 'gear', 'wheel'];
  if (joint === undefined || !wanted.includes(joint.kind))
    throw new EngineError(
      'unknown-reference',
      `${field}.joint`,
      `There is no ${wanted[0] === 'link' ? 'link' : 'sliding joint'} ${k.joint}.`,
    );
  return { ...common, kind: 'slide', joint };
};

const compileVector = (
  k: VectorKnown,
  index: number,
  field: string,
  layout: Layout,
  references: References,
): ModelKnown[] => {
  const a = references.place(k.at, `${field}.at`);
  const common = { id: k.id, index, level: k.quantity, a } as const;
  const polar = k.magnitude !== undefined || k.direction !== undefined;
  if (k.components !== undefined && polar)
    throw new EngineError(
      'unsupported',
      `${field}.components`,
      `${k.id} gives components as well as a magnitude or direction.`,
    );
  if (k.components !== undefined) return [components(k, k.components, common, field, layout)];
  if (!polar) throw new EngineError('empty', field, `${k.id} says nothing of the ${k.quantity}.`);
  return compilePolar(k, common, field, layout);
};

interface Common {
  readonly id: string;
  readonly index: number;
  readonly level: Level;
  readonly a: Place;
}

const components = (
  k: VectorKnown,
  value: readonly [number, number],
  common: Common,
  field: string,
  layout: Layout,
): ModelKnown => {
  const xAt = layout.linear(value[0]);
  layout.linear(value[1]);
  const { sigma } = k;
  if (typeof sigma === 'object' && !Array.isArray(sigma))
    throw new EngineError(
      'unsupported',
      `${field}.sigma`,
      `The uncertainty of the components of ${k.id} must be given for x and y.`,
    );
  const pair: [number, number] | undefined =
    typeof sigma === 'number' ? [sigma, sigma] : Array.isArray(sigma) ? sigma : undefined;
  layout.noises.push(
    ...pairNoises(
      { kind: 'known', id: k.id },
      [xAt, xAt + 1],
      { sigma: pair, covariance: k.covariance },
      field,
    ),
  );
  const parts: KnownPart[] = [
    { part: 'x', at: xAt },
    { part: 'y', at: xAt + 1 },
  ];
  return { ...common, kind: 'components', xAt, parts };
};

const polarSigma = (k: VectorKnown, field: string): { magnitude?: number; direction?: number } => {
  const { sigma } = k;
  if (Array.isArray(sigma) || k.covariance !== undefined)
    throw new EngineError(
      'unsupported',
      `${field}.sigma`,
      `The uncertainty of ${k.id} must be given for its magnitude and direction.`,
    );
  if (typeof sigma !== 'number') return sigma ?? {};
  if (k.magnitude !== undefined && k.direction !== undefined)
    throw new EngineError(
      'unsupported',
      `${field}.sigma`,
      `The uncertainty of ${k.id} must say which part is of its magnitude, which of its direction.`,
    );
  return k.magnitude !== undefined ? { magnitude: sigma } : { direction: sigma };
};

const compilePolar = (
  k: VectorKnown,
  common: Common,
  field: string,
  layout: Layout,
): ModelKnown[] => {
  const sigma = polarSigma(k, field);
  if (k.magnitude !== undefined && k.magnitude < 0)
    throw new EngineError('not-positive', `${field}.magnitude`, `${field}.magnitude is negative.`);
  // A magnitude of zero has no direction: it is a vector of zeros.
  if (k.magnitude === 0)
    return [components({ ...k, sigma: sigma.magnitude }, [0, 0], common, field, layout)];
  const parts: KnownPart[] = [];
  const noise = (at: number, part: 'magnitude' | 'direction', s: number | undefined): void => {
    layout.uncertain('known', k.id, at, s, `${field}.sigma.${part}`);
    parts.push({ part, at });
  };
  const magnitudeAt = k.magnitude === undefined ? -1 : layout.linear(k.magnitude);
  if (magnitudeAt >= 0) noise(magnitudeAt, 'magnitude', sigma.magnitude);
  const directionAt = k.direction === undefined ? -1 : layout.angle(k.direction);
  if (directionAt >= 0) noise(directionAt, 'direction', sigma.direction);
  const vector: ModelKnown = {
    ...common,
    kind: 'polar',
    magnitudeAt,
    directionAt,
    line: k.line === true,
    parts,
  };
  if (k.quantity !== 'velocity' || k.curvature === undefined) return [vector];
  if (directionAt < 0)
    throw new EngineError(
      'empty',
      `${field}.direction`,
      `The curvature of ${k.id} needs the direction of the mark.`,
    );
  const curvatureAt = layout.linear(k.curvature.value);
  layout.uncertain('known', k.id, curvatureAt, k.curvature.sigma, `${field}.curvature.sigma`);
  const curved: ModelKnown = {
    ...common,
    level: 'acceleration',
    kind: 'curvature',
    directionAt,
    curvatureAt,
    parts: [{ part: 'curvature', at: curvatureAt }],
  };
  return [vector, curved];
};
