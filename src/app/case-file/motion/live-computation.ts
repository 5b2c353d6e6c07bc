import { canonicalText } from '#shared/engine/documents/canonical';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import type { StationAnswer, StationMark } from '#shared/engine/documents/station';
import { EngineError } from '#shared/engine/errors';
import { relativeMotion, workInstant } from '#shared/engine/instant/index';
import {
  answerStation,
  poseOfStation,
  solveStation,
  stationProblemOf,
} from '#shared/engine/reconstruction/index';
import type { Asked, LiveData, LiveReply, LiveRequest, RecordedRequest } from './live-messages';
import type { Poses } from './plan-scene';

/** Answers one request; what the engine refuses comes back as a value, since a class does not cross over. */
export function answerLive(request: LiveRequest): LiveReply {
  try {
    return { ok: true, data: compute(request) };
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    const { code, field, message } = error;
    return { ok: false, fault: { code, field, message } };
  }
}

function compute(request: LiveRequest): LiveData {
  if (request.kind === 'recorded') {
    const { problem, answer } = request;
    return {
      stationId: problem.station.id,
      answer,
      others: {},
      now: compare(request),
      ...derive(answer, request),
    };
  }
  const { document, marks, stationId } = request;
  const answer = answerStation(document, stationId, marks);
  return {
    stationId,
    answer,
    others: posesElsewhere(document, marks, stationId),
    now: null,
    ...derive(answer, request),
  };
}

function compare({ problem, now }: RecordedRequest): LiveData['now'] {
  if (now === null || !now.document.stations.some(({ id }) => id === problem.station.id)) {
    return null;
  }
  const today = stationProblemOf(now.document, problem.station.id, now.marks);
  return {
    sameInput: canonicalText(today) === canonicalText(problem),
    answer: solveStation(today),
  };
}

/** The derivation of the asked point and its motion against a second one, branch by branch. */
function derive(
  { problem, solution }: StationAnswer,
  { point, against, normal }: Asked,
): Pick<LiveData, 'workings' | 'relative'> {
  const placed = new Set(problem?.bodies.map((body) => body.id));
  if (problem === null || solution === null || point === null || !placed.has(point.body)) {
    return { workings: [], relative: null };
  }
  const sides = solution.branches.map((_, branch) => branch);
  return {
    workings: sides.map((branch) => workInstant(problem, solution, point, branch)),
    relative:
      against === null || !placed.has(against.body)
        ? null
        : sides.map((branch) =>
            unlessRefused(() =>
              relativeMotion(problem, solution, branch, point, against, normal ?? undefined),
            ),
          ),
  };
}

/** null for what the engine refuses (two points at one place have no direction between them). */
function unlessRefused<T>(work: () => T): T | null {
  try {
    return work();
  } catch (error) {
    if (error instanceof EngineError) return null;
    throw error;
  }
}

/** Poses by the input that they came from: while one station is edited the others stay as they are. */
const known = new Map<string, Poses>();
const mostKnown = 200;

function posesElsewhere(
  document: ReconstructionDocument,
  marks: readonly StationMark[],
  stationId: string,
): Record<string, Poses> {
  const others: Record<string, Poses> = {};
  for (const station of document.stations) {
    if (station.id !== stationId) others[station.id] = posesAt(document, marks, station.id);
  }
  return others;
}

function posesAt(
  document: ReconstructionDocument,
  marks: readonly StationMark[],
  stationId: string,
): Poses {
  try {
    const problem = stationProblemOf(document, stationId, marks);
    const input = JSON.stringify(problem);
    const found = known.get(input) ?? posesOf(poseOfStation(problem).solution.bodies);
    if (known.size >= mostKnown) known.clear();
    known.set(input, found);
    return found;
  } catch (error) {
    // A station that is not complete yet has no ghosts; its own sheet says why.
    if (error instanceof EngineError) return {};
    throw error;
  }
}

function posesOf(bodies: Record<string, { pose: Poses[string] }>): Poses {
  return Object.fromEntries(Object.entries(bodies).map(([id, { pose }]) => [id, pose]));
}
