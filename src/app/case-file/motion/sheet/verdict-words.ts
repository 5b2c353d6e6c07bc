import type {
  Level,
  MotionSolution,
  MotionStatus,
  Suggestion,
} from '#shared/engine/documents/motion-solution';
import { showPlain } from '#shared/units/rounding';
import type { Names } from '../names';

/** The standing of an answer: whether it may be leaned on. State is told by the words, too. */
export type Standing = 'sound' | 'open' | 'broken';

export interface Verdict {
  readonly standing: Standing;
  readonly title: string;
  /** Sentences after the title. */
  readonly says: readonly string[];
  /** The knowns that are suspect or clash, by id, to be linked. */
  readonly names: readonly string[];
}

const titles: Readonly<Record<MotionStatus, string>> = {
  determined: 'Determined.',
  'over-determined': 'Over-determined.',
  'under-determined': 'This cannot be determined yet.',
  contradictory: 'Contradictory.',
  singular: 'Singular position.',
};

/** What the solution says of itself, in plain words. */
export function verdictOf(solution: MotionSolution): Verdict {
  const { velocity, acceleration } = solution.levels;
  const names = solution.status === 'contradictory' ? solution.clash : solution.suspects;
  return {
    standing: standingOf(solution),
    title: titles[solution.status],
    says: [
      ...saysOf(solution),
      ...(velocity.status === 'over-determined' || acceleration?.status === 'over-determined'
        ? [suspectsOf(solution)]
        : []),
    ],
    names,
  };
}

function standingOf(solution: MotionSolution): Standing {
  switch (solution.status) {
    case 'determined':
      return 'sound';
    case 'over-determined':
      return solution.suspects.length > 0 ? 'broken' : 'sound';
    case 'under-determined':
      return 'open';
    default:
      return 'broken';
  }
}

function saysOf(solution: MotionSolution): string[] {
  const { velocity } = solution.levels;
  const count = `${velocity.unknowns} unknowns, ${velocity.equations} equations`;
  switch (solution.status) {
    case 'determined':
      return [`${count}. Nothing checks the knowns: an error in one would not show.`];
    case 'over-determined':
      return [
        `${count}, redundancy ${solution.redundancy}; χ² ${showPlain(solution.chiSquared, 2)}${
          solution.pValue === null ? '' : `, p ${showPlain(solution.pValue, 2)}`
        }.`,
      ];
    case 'under-determined':
      return [`${count}, of which ${velocity.rank} are independent.`];
    case 'contradictory':
      return ['These cannot all hold at once, so there is no motion that agrees with them:'];
    case 'singular':
      return [
        `${count}. In this position the joints leave the motion open although the count is right (a dead centre).`,
      ];
  }
}

function suspectsOf(solution: MotionSolution): string {
  if (solution.suspects.length === 0) return 'No suspect known.';
  return solution.suspects.length === 1
    ? 'One known does not fit the others (normalised residual over 3.29, that is 1 in 1000):'
    : 'Some knowns do not fit the others (normalised residual over 3.29, that is 1 in 1000):';
}

/** What a level leaves free, and the further known that would settle it. */
export interface Lack {
  readonly level: Level;
  readonly free: readonly string[];
  readonly helps: readonly string[];
}

const mostHelps = 4;

/** What is not fixed, velocities first: as long as they are free the accelerations cannot be asked. */
export function lacksOf(solution: MotionSolution, names: Names): Lack[] {
  return (['velocity', 'acceleration'] as const).flatMap((level) => {
    const free = solution.free.filter((one) => one.level === level);
    if (free.length === 0) return [];
    const helps = solution.suggestions.flatMap((one) => {
      const ofVelocity = one.quantity === 'velocity' || one.quantity === 'angular-velocity';
      return ofVelocity === (level === 'velocity') ? [helpWords(one, names)] : [];
    });
    return [
      {
        level,
        free: free.map(({ motion }) => sentence(motion.replace(/^accelerations only: /, ''))),
        helps: [
          ...helps.slice(0, mostHelps),
          ...(helps.length > mostHelps ? ['the same of another point'] : []),
        ],
      },
    ];
  });
}

function helpWords(one: Suggestion, names: Names): string {
  if (!('at' in one)) {
    return one.quantity === 'angular-velocity'
      ? `how fast ${names.body(one.body)} turns`
      : `how the turning of ${names.body(one.body)} changes`;
  }
  const part = one.part === 'components' ? '' : `the ${one.part} of `;
  return `${part}the ${one.quantity} of ${names.point(one.at)}`;
}

const sentence = (text: string): string =>
  `${text.charAt(0).toUpperCase()}${text.slice(1)}${text.endsWith('.') ? '' : '.'}`;
