import { CAR, GRAVITY, type SpinMotion, type Wheel, WHEELS, wheelLoads } from './spin-motion';
import {
  MARK_SIGMA,
  RECORDER_START,
  STATION_IDS,
  STATION_TIMES,
  type SpinSurvey,
  type StationId,
  TRACE_OF,
  recordedAt,
  recorder,
} from './spin-survey';
import { rounded } from './folder';
import {
  type Alternative,
  type Known,
  type Reconstruction,
  type SceneBody,
  type Station,
  type TraceDescription,
} from './scene';
import type { Vec2 } from './plane-motion';

export const EXHIBIT = {
  survey: 1,
  recorder: 2,
  recorderData: 3,
  photographs: 4,
  vehicle: 5,
  sketch: 6,
  tyre: 7,
};
const POINT_SIGMA = 0.015;

const OUTLINE: Vec2[] = [
  [2.0, 0.62],
  [1.75, 0.85],
  [-2.0, 0.86],
  [-2.24, 0.7],
  [-2.24, -0.7],
  [-2.0, -0.86],
  [1.75, -0.85],
  [2.0, -0.62],
];

const WHEEL_TITLES: Record<Wheel, string> = {
  LF: 'left front wheel, contact point',
  RF: 'right front wheel, contact point',
  LR: 'left rear wheel, contact point',
  RR: 'right rear wheel, contact point',
};

export function carBody(): SceneBody {
  const wheels = WHEELS.map((wheel) => [
    wheel,
    { at: CAR.wheels[wheel], sigma: [POINT_SIGMA, POINT_SIGMA], title: WHEEL_TITLES[wheel] },
  ]);
  const g = { at: [0, 0], sigma: [0, 0], title: 'centre of gravity (origin of the body frame)' };
  return {
    id: 'car',
    name: 'Vehicle 1, four-door saloon',
    colour: 'blue',
    points: Object.fromEntries([['G', g], ...wheels]) as SceneBody['points'],
    outline: OUTLINE,
    mass: { value: 1420, sigma: 25 },
    inertia: { value: 2310, sigma: 120 },
  };
}

function stationsOf(survey: SpinSurvey, motion: SpinMotion): Station[] {
  const samples = recorder(motion);
  const fixedByGap = (id: StationId, index: number): Station => {
    const speed = recordedAt(samples, STATION_TIMES[id], 'speed');
    const yaw = recordedAt(samples, STATION_TIMES[id], 'yawRate');
    const source = { file: 'recorder.csv', exhibit: EXHIBIT.recorderData };
    const directions = WHEELS.map((wheel): Known => {
      const { direction, sigma } = survey.tangents[id][wheel];
      return {
        id: `${id}-direction-${wheel}`,
        title: `Tangent of ${TRACE_OF[wheel]} at the mark`,
        source: { survey: [survey.stationMarks[id][wheel]], exhibit: EXHIBIT.survey },
        quantity: 'velocity',
        at: { body: 'car', point: wheel },
        direction,
        sigma: { direction: sigma },
      };
    });
    const recorded: Known = {
      id: `${id}-speed`,
      title: 'Speed of the centre of gravity from the recorder',
      source,
      quantity: 'velocity',
      at: { body: 'car', point: 'G' },
      magnitude: speed.value,
      sigma: { magnitude: speed.sigma },
    };
    const check: Known = {
      id: `${id}-yaw-rate`,
      title: 'Yaw rate from the recorder, held out as a check',
      source,
      quantity: 'angular-velocity',
      body: 'car',
      value: yaw.value,
      sigma: yaw.sigma,
    };
    return rounded(
      {
        id,
        title: index === 0 ? 'Wheels lock' : `Gap ${index} in all four marks`,
        basis:
          index === 0
            ? 'All four marks begin here; the recorder shows the brake pressure rising at the same sample.'
            : `The recorder shows pressure pulse ${index}; each wheel rolled for less than 0.03 s and left a gap.`,
        marks: marksOf(survey, id),
        tangents: directions,
        knowns: [recorded],
        checks: [check],
      },
      5,
    );
  };
  return [
    ...STATION_IDS.map(fixedByGap),
    {
      id: 'S7',
      title: 'Point of rest',
      basis: 'Wheels of the vehicle as found, not moved before the survey.',
      marks: marksOf(survey, 'S7'),
      tangents: [],
      knowns: [],
      checks: [],
    },
  ];
}

function marksOf(survey: SpinSurvey, id: StationId | 'S7'): Station['marks'] {
  return WHEELS.map((wheel) => ({
    survey: survey.stationMarks[id][wheel],
    body: 'car',
    point: wheel,
  }));
}

function tracesOf(survey: SpinSurvey): TraceDescription[] {
  return WHEELS.map((wheel): TraceDescription => ({
    id: TRACE_OF[wheel],
    title: `Trace ${TRACE_OF[wheel]}`,
    kind: 'yaw mark',
    body: 'car',
    point: wheel,
    sigma: MARK_SIGMA,
    points: survey.traces[wheel],
  })).sort((a, b) => a.id.localeCompare(b.id));
}

function rearExchanged(survey: SpinSurvey): Alternative {
  const swap = { LR: 'RR', RR: 'LR' } as const;
  const marks: Alternative['marks'] = {};
  for (const id of [...STATION_IDS, 'S7'] as const) {
    if (id === 'S7') continue;
    for (const wheel of ['LR', 'RR'] as const) {
      marks[survey.stationMarks[id][wheel]] = { body: 'car', point: swap[wheel] };
    }
  }
  return {
    id: 'B',
    title: 'Rear marks exchanged',
    assumption: 'T2 was made by the right rear wheel and T4 by the left rear wheel.',
    traces: {
      [TRACE_OF.LR]: { body: 'car', point: 'RR' },
      [TRACE_OF.RR]: { body: 'car', point: 'LR' },
    },
    marks,
    droppedJoints: [],
  };
}

export function reconstruction(survey: SpinSurvey, motion: SpinMotion): Reconstruction {
  const loads = wheelLoads();
  const clock = STATION_IDS.map((id) => [
    id,
    { time: STATION_TIMES[id] + RECORDER_START, sigma: 0.015 },
  ]);
  return {
    title: 'Spin of vehicle 1, all marks',
    assumption: 'T1 left front, T2 left rear, T3 right front, T4 right rear; all wheels locked.',
    bodies: [carBody()],
    joints: [],
    stations: stationsOf(survey, motion),
    traces: tracesOf(survey),
    timeBase: [
      {
        kind: 'stations',
        times: Object.fromEntries(clock) as Record<string, { time: number; sigma: number }>,
      },
      {
        kind: 'speed-series',
        file: 'recorder.csv',
        columns: { time: 'T_rec [s]', speed: 'V_CG [km/h]' },
        speedUnit: 'km/h',
        at: { body: 'car', point: 'G' },
        sigma: 0.3,
        offset: { value: -RECORDER_START, sigma: 0.03 },
      },
      {
        kind: 'walk-back',
        end: { speed: 0, sigma: 0 },
        mass: { car: CAR.mass },
        inertia: { car: CAR.inertia },
        gravity: GRAVITY,
        grade: [0, 0],
        wheels: WHEELS.map((wheel) => ({
          body: 'car',
          point: wheel,
          load: Math.round(loads[wheel]),
          state: 'locked' as const,
          steer: 0,
        })),
        surfaces: [{ polygon: null, dragFactor: 0.7, sigma: 0.04 }],
      },
    ],
    alternatives: [rearExchanged(survey)],
    asked: [
      { station: 'S1', body: 'car', point: 'G', quantity: 'speed', question: 1 },
      { station: 'S1', body: 'car', point: null, quantity: 'yaw rate', question: 2 },
      { station: 'S4', body: 'car', point: 'RR', quantity: 'velocity', question: 3 },
    ],
  };
}
