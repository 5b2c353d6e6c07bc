import { type Draft, photographFile, sealedItemCustody, whereaboutsAt } from './draft';
import { rounded } from './folder';
import { JACK_KNIFE_SHOTS, jackKnifeStages } from './jack-knife-pictures';
import { TRACTOR_OUTLINE, TRAILER_OUTLINE, jackKnifeSketch } from './jack-knife-sketch';
import { type JackKnifeMotion, UNIT, axleLoads, jackKnifeMotion } from './jack-knife-motion';
import {
  TACHOGRAPH_START,
  UNIT_COLUMNS,
  UNIT_CONTROL,
  UNIT_MARK_SIGMA,
  UNIT_STATION_IDS,
  UNIT_STATION_TIMES,
  UNIT_TRACES,
  type UnitStationId,
  type UnitSurvey,
  jackKnifeSurvey,
  rollsAt,
  tachograph,
  tachographCsv,
  trailerWheelAt,
  unitSurveyCsv,
} from './jack-knife-survey';
import { jackKnifeTruth } from './jack-knife-truth';
import type { Vec2 } from './plane-motion';
import {
  type Joint,
  type Known,
  NOTICE,
  type Reconstruction,
  type SceneBody,
  type Station,
} from './scene';

const BEARING_OF_X = 112;
const ORIGIN = { latitude: -46.8834, longitude: -121.0412, altitude: 112 };
const EXHIBIT = {
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

const JOINTS: Joint[] = [
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

function reconstruction(survey: UnitSurvey, motion: JackKnifeMotion): Reconstruction {
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

/** The whole of case 2026-013 but its pictures. */
export function jackKnifeDraft(): Draft {
  const motion = jackKnifeMotion();
  const survey = jackKnifeSurvey(motion);
  const base = { packaging: null, seal: null, sensitivity: 'ordinary', parent: null } as const;
  const digital = { ...base, location: 'Digital store' } as const;
  return {
    folder: 'jack-knife',
    scene: {
      number: '2026-013',
      title: 'Articulated unit, Tarn Cutting',
      kind: 'road',
      place: { name: 'Tarn Cutting, second straight (invented)', ...ORIGIN, utcOffset: '-08:00' },
      incidentAt: '2026-09-29T06:35:00-08:00',
      bearingOfX: BEARING_OF_X,
      frame:
        'Local grid of the survey: x along the road in the direction of travel, y to its left.',
      brief: {
        instructedBy: 'B. Castellane',
        instructedAt: '2026-10-01T11:00:00-08:00',
        dueAt: '2026-12-11T17:00:00-08:00',
        background:
          'Traffic keeps to the left. On a wet road the tractor of a laden articulated unit folded to the right and blocked both lanes. ' +
          'An oncoming van struck the bank. The claimant says that the unit was speeding; the defendant ' +
          'says that a brake valve locked the drive wheels without warning.',
        questions: [
          { number: 1, text: 'How fast was the unit when its drive wheels locked?' },
          {
            number: 2,
            text: 'How quickly did tractor and trailer turn while the trailer still rolled?',
          },
          {
            number: 3,
            text: 'With what speed and in what direction did the cab enter the opposite lane?',
          },
        ],
        cautions: [
          'Closed carriageway only. Articulated units can fold further: chock, drain the air, keep out of the gap.',
        ],
      },
      parties: [
        {
          id: 'claimant',
          name: 'The claimant, driver of the van',
          role: 'claimant',
          attorney: 'A. Thorne',
        },
        {
          id: 'defendant',
          name: 'The defendant, keeper of the unit',
          role: 'defendant',
          attorney: 'B. Castellane',
        },
      ],
      people: [
        { name: 'S. Lindqvist', role: 'lead-investigator' },
        { name: 'R. Amadi', role: 'investigator' },
        { name: 'E. Varo', role: 'technical-reviewer' },
        { name: 'J. Oduya', role: 'evidence-custodian' },
      ],
      custody: [
        ...sealedItemCustody({
          exhibit: EXHIBIT.tachograph,
          collectedAt: '2026-09-29T11:20:00-08:00',
          collectedBy: 'R. Amadi',
          custodian: 'J. Oduya',
          receivedAt: '2026-09-29T15:10:00-08:00',
          examiner: 'S. Lindqvist',
          examinedAt: '2026-10-02T09:15:00-08:00',
          seals: ['QL 204388', 'QL 204396'],
          from: 'Tarn Cutting',
        }),
        ...sealedItemCustody({
          exhibit: EXHIBIT.valve,
          collectedAt: '2026-09-30T10:05:00-08:00',
          collectedBy: 'S. Lindqvist',
          custodian: 'J. Oduya',
          receivedAt: '2026-09-30T14:30:00-08:00',
          examiner: 'S. Lindqvist',
          examinedAt: '2026-10-05T10:45:00-08:00',
          seals: ['QL 204390', 'QL 204399'],
          from: 'Recovery yard at Tarn Cutting',
        }),
      ],
      survey: {
        file: 'survey.csv',
        lengthUnit: 'm',
        delimiter: ',',
        columns: {
          id: UNIT_COLUMNS[0],
          code: UNIT_COLUMNS[1],
          string: UNIT_COLUMNS[2],
          sequence: UNIT_COLUMNS[3],
          x: UNIT_COLUMNS[4],
          y: UNIT_COLUMNS[5],
          height: UNIT_COLUMNS[6],
          sigmaX: UNIT_COLUMNS[7],
          sigmaY: UNIT_COLUMNS[8],
          remark: UNIT_COLUMNS[9],
        },
        sigmaUnit: 'mm',
        instrument: 'Total station QS 2 with 360-degree prism (invented instrument)',
        surveyedBy: 'R. Amadi',
        surveyedAt: '2026-09-29T09:15:00-08:00',
        codes: {
          CP: 'control point',
          RE: 'road edge',
          LM: 'line marking',
          SK: 'skid mark, point on a trace',
          SCR: 'scrub, point on a trace',
          TM: 'tyre mark, rolling print, point on a trace',
          RLS: 'tyre mark, begin or brake release that fixes a station',
          POR: 'point of rest, wheel of the unit',
          GO: 'gouge',
          DB: 'debris',
        },
        controlPoints: Object.keys(UNIT_CONTROL),
        lines: survey.lines,
      },
      reconstruction: reconstruction(survey, motion),
    },
    exhibits: [
      {
        ...digital,
        number: EXHIBIT.survey,
        kind: 'survey-data',
        title: 'Total-station survey of the cutting',
        description: 'Control, carriageway, five traces with five brake releases, wheels at rest.',
        source: 'Tarn Cutting, before the unit was recovered',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T09:15:00-08:00',
        condition: 'Complete export, 1 file',
        files: [['survey.csv', 'Survey export']],
      },
      {
        ...base,
        number: EXHIBIT.tachograph,
        kind: 'physical-item',
        title: 'Tachograph and trailer brake controller',
        description: 'Both units with their looms, taken from cab and trailer frame.',
        source: 'The articulated unit at its point of rest',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T11:20:00-08:00',
        condition: 'Intact, damp outside',
        packaging: 'Two antistatic bags in a rigid box',
        seal: 'QL 204396',
        location: 'Exhibit store, shelf 1',
        files: [],
      },
      {
        ...digital,
        number: EXHIBIT.readOut,
        kind: 'recorder-data',
        title: 'Read-out of tachograph and brake controller',
        description:
          'Shaft speed (nought while the drive wheels are locked), trailer wheel speed, brake pressure, 20 Hz.',
        source: 'Read out from exhibit 2',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-10-02T10:10:00-08:00',
        condition: 'Read twice, identical',
        parent: EXHIBIT.tachograph,
        files: [['tachograph.csv', 'Read-out']],
      },
      {
        ...digital,
        number: EXHIBIT.photographs,
        kind: 'photograph-set',
        title: 'Photographs of the cutting',
        description: 'Six photographs with number boards and targets on the control points.',
        source: 'Tarn Cutting',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T08:41:00-08:00',
        condition: 'Originals from the camera card',
        files: JACK_KNIFE_SHOTS.map((shot) => [photographFile(shot), shot.title] as const),
      },
      {
        ...digital,
        number: EXHIBIT.dimensions,
        kind: 'document',
        title: 'Dimensions of tractor and semi-trailer',
        description: 'Wheels and kingpin from the centres of gravity, axle loads, outlines.',
        source: 'Measured in the recovery yard',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-09-30T09:00:00-08:00',
        condition: 'Complete',
        files: [['vehicle.json', 'Dimensions']],
      },
      {
        ...digital,
        number: EXHIBIT.sketch,
        kind: 'document',
        title: 'Scene sketch',
        description: 'Field sketch with control points, traces, releases and the unit at rest.',
        source: 'Drawn at the scene',
        collectedBy: 'R. Amadi',
        collectedAt: '2026-09-29T10:30:00-08:00',
        condition: '1 page',
        files: [['scene-sketch.pdf', 'Scene sketch']],
      },
      {
        ...base,
        number: EXHIBIT.valve,
        kind: 'physical-item',
        title: 'Brake modulator valve of the drive axle',
        description: 'Valve with both couplings capped.',
        source: 'Tractor, right frame rail',
        collectedBy: 'S. Lindqvist',
        collectedAt: '2026-09-30T10:05:00-08:00',
        condition: 'Corroded connector, one pin green',
        packaging: 'Rigid box with foam',
        seal: 'QL 204399',
        location: 'Exhibit store, shelf 2',
        files: [],
      },
    ],
    texts: {
      'survey.csv': unitSurveyCsv(survey.book.rows),
      'tachograph.csv': tachographCsv(tachograph(motion)),
    },
    documents: {
      'vehicle.json': {
        format: 'centrode.demo-body/1',
        notice: NOTICE,
        bodies: unitBodies(),
        joints: JOINTS,
      },
      'truth.json': jackKnifeTruth(motion),
    },
    shots: [...JACK_KNIFE_SHOTS],
    visible: Object.entries(UNIT_CONTROL).map(([id, [x, y]]) => ({ survey: id, point: [x, y, 0] })),
    whereabouts: whereaboutsAt(ORIGIN, BEARING_OF_X),
    stages: () => jackKnifeStages(motion),
    sketch: jackKnifeSketch(survey, motion, BEARING_OF_X),
    sketchFile: 'scene-sketch.pdf',
  };
}
