import { rounded } from './folder';
import { TRACTOR_OUTLINE, TRAILER_OUTLINE } from './jack-knife-sketch';
import { type JackKnifeMotion, UNIT, axleLoads } from './jack-knife-motion';
import {
  TACHOGRAPH_START,
  UNIT_MARK_SIGMA,
  UNIT_STATION_IDS,
  UNIT_STATION_TIMES,
  UNIT_TRACES,
  type UnitStationId,
  type UnitSurvey,
  rollsAt,
  tachograph,
  trailerWheelAt,
} from './jack-knife-survey';
import type { Vec2 } from './plane-motion';
import { type Joint, type Known, type Reconstruction, type SceneBody, type Station } from './scene';

export const EXHIBIT = {
  survey: 1,
  tachograph: 2,
  readOut: 3,
  photographs: 4,
  dimensions: 5,
  sketch: 6,
  valve: 7,
};

const TITLES: Record<string, string> = {
  K: 'kingpin',
  SL: 'left steered wheel, contact point',
  SR: 'right steered wheel, contact point',
  DL: 'left drive wheels, middle of the pair',
  DR: 'right drive wheels, middle of the pair',
  axle: 'middle of the axle group',
  AL: 'left wheel of the middle trailer axle',
  AR: 'right wheel of the middle trailer axle',
};

function pointsOf(body: 'tractor' | 'trailer'): SceneBody['points'] {
  const points = Object.entries(UNIT.points[body]).map(([name, at]) => {
    const sigma: Vec2 = name === 'axle' ? [0.02, 0] : [0.02, 0.015];
    return [name, { at: at as Vec2, sigma, title: TITLES[name] }];
  });
  const g = { at: [0, 0], sigma: [0, 0], title: 'centre of gravity (origin of the body frame)' };
  return Object.fromEntries([['G', g], ...points]) as SceneBody['points'];
}

export function unitBodies(): SceneBody[] {
  return [
    {
      id: 'tractor',
      name: 'Two-axle tractor',
      colour: 'red',
      points: pointsOf('tractor'),
      outline: TRACTOR_OUTLINE,
      mass: { value: UNIT.tractor.mass, sigma: 60 },
      inertia: { value: UNIT.tractor.inertia, sigma: 1500 },
    },
    {
      id: 'trailer',
      name: 'Box semi-trailer, laden',
      colour: 'grey',
      points: pointsOf('trailer'),
      outline: TRAILER_OUTLINE,
      mass: { value: UNIT.trailer.mass, sigma: 150 },
      inertia: { value: UNIT.trailer.inertia, sigma: 12000 },
    },
  ];
}

export const JOINTS: Joint[] = [
  {
    id: 'kingpin',
    title: 'Kingpin in the coupling',
    kind: 'pin',
    a: { body: 'tractor', point: 'K' },
    b: { body: 'trailer', point: 'K' },
  },
  {
    id: 'trailer-axle',
    title: 'Trailer axle rolls without side-slip while its prints show tread',
    kind: 'wheel',
    a: { body: 'trailer', point: 'axle' },
    steer: 0,
    stations: UNIT_STATION_IDS.filter(rollsAt),
  },
];

function marksOf(survey: UnitSurvey, id: UnitStationId | 'S7'): Station['marks'] {
  return UNIT_TRACES.filter((trace) => trace.id in survey.stationMarks[id]).map((trace) => ({
    survey: survey.stationMarks[id][trace.id],
    body: trace.body,
    point: trace.point,
  }));
}

function stationsOf(survey: UnitSurvey, motion: JackKnifeMotion): Station[] {
  const samples = tachograph(motion);
  const moving = UNIT_STATION_IDS.map((id, index): Station => {
    const used = UNIT_TRACES.filter(
      (trace) => trace.id in survey.tangents[id] && !(rollsAt(id) && trace.body === 'trailer'),
    );
    const directions = used.map((trace): Known => {
      const { direction, sigma } = survey.tangents[id][trace.id];
      return {
        id: `${id}-direction-${trace.point}`,
        title: `Tangent of ${trace.id} at the mark`,
        source: { survey: [survey.stationMarks[id][trace.id]], exhibit: EXHIBIT.survey },
        quantity: 'velocity',
        at: { body: trace.body, point: trace.point },
        direction,
        sigma: { direction: sigma },
      };
    });
    const speed = trailerWheelAt(samples, UNIT_STATION_TIMES[id]);
    const axle: Known = {
      id: `${id}-speed`,
      title: 'Speed of the rolling trailer axle from its wheel sensor',
      source: { file: 'tachograph.csv', exhibit: EXHIBIT.readOut },
      quantity: 'velocity',
      at: { body: 'trailer', point: 'axle' },
      magnitude: speed.value,
      sigma: { magnitude: speed.sigma },
    };
    return rounded(
      {
        id,
        title: index === 0 ? 'Drive wheels lock' : `Release ${index}`,
        basis:
          index === 0
            ? 'U1 and U2 begin here; the shaft speed falls to nought at the same sample.'
            : `Brake pressure pulse ${index} in the tachograph; all marks change character at once.`,
        marks: marksOf(survey, id),
        tangents: directions,
        knowns: rollsAt(id) ? [axle] : [],
        checks: [],
      },
      5,
    );
  });
  const rest: Station = {
    id: 'S7',
    title: 'Point of rest',
    basis: 'Wheels of the unit as found, not moved before the survey.',
    marks: marksOf(survey, 'S7'),
    tangents: [],
    knowns: [],
    checks: [],
  };
  return [...moving, rest];
}

export function reconstruction(survey: UnitSurvey, motion: JackKnifeMotion): Reconstruction {
  const loads = axleLoads();
  const clock = UNIT_STATION_IDS.map((id) => [
    id,
    { time: UNIT_STATION_TIMES[id] + TACHOGRAPH_START, sigma: 0.015 },
  ]);
  const wheels = (
    [
      ['tractor', 'SL', loads.steer, 'free'],
      ['tractor', 'SR', loads.steer, 'free'],
      ['tractor', 'DL', loads.drive, 'locked'],
      ['tractor', 'DR', loads.drive, 'locked'],
      ['trailer', 'AL', loads.axle, 'locked'],
      ['trailer', 'AR', loads.axle, 'locked'],
    ] as const
  ).map(([body, point, load, state]) => ({
    body,
    point,
    load: Math.round(load / 2),
    state,
    steer: 0,
  }));
  return {
    title: 'Folding of the articulated unit',
    assumption: 'The trailer axle rolled without side-slip up to release 3 and slid after it.',
    bodies: unitBodies(),
    joints: JOINTS,
    stations: stationsOf(survey, motion),
    traces: UNIT_TRACES.map(({ id, title, kind, body, point }) => ({
      id,
      title: `Trace ${id}: ${title.toLowerCase()}`,
      kind,
      body,
      point,
      sigma: UNIT_MARK_SIGMA,
      points: survey.traces[id],
    })),
    timeBase: [
      {
        kind: 'stations',
        times: Object.fromEntries(clock) as Record<string, { time: number; sigma: number }>,
      },
      {
        kind: 'walk-back',
        end: { speed: 0, sigma: 0 },
        mass: { tractor: UNIT.tractor.mass, trailer: UNIT.trailer.mass },
        inertia: { tractor: UNIT.tractor.inertia, trailer: UNIT.trailer.inertia },
        gravity: 9.80665,
        grade: [0, 0],
        wheels,
        surfaces: [{ polygon: null, dragFactor: 0.52, sigma: 0.04 }],
      },
    ],
    alternatives: [
      {
        id: 'B',
        title: 'Trailer already sliding',
        assumption:
          'The trailer axle side-slipped from the first mark on: the wheel joint is dropped.',
        traces: {},
        marks: {},
        droppedJoints: ['trailer-axle'],
      },
    ],
    asked: [
      { station: 'S1', body: 'tractor', point: 'G', quantity: 'speed', question: 1 },
      { station: 'S4', body: 'tractor', point: null, quantity: 'yaw rate', question: 2 },
      { station: 'S4', body: 'trailer', point: null, quantity: 'yaw rate', question: 2 },
      { station: 'S4', body: 'tractor', point: 'SR', quantity: 'velocity', question: 3 },
    ],
  };
}
