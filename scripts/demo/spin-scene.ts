import { type Draft, photographFile } from './draft';
import { sealedItemCustody, whereaboutsAt } from './draft';
import { spinMotion } from './spin-motion';
import { SPIN_SHOTS, spinStages } from './spin-pictures';
import {
  CONTROL,
  SPIN_COLUMNS,
  recorder,
  recorderCsv,
  spinSurvey,
  totalStationCsv,
} from './spin-survey';
import { spinTruth } from './spin-truth';
import { spinSketch } from './spin-sketch';
import { NOTICE } from './scene';
import { EXHIBIT, carBody, reconstruction } from './spin-reconstruction';

const BEARING_OF_X = 68;
const ORIGIN = { latitude: -47.5201, longitude: -120.2096, altitude: 31.4 };
/** The whole of case 2026-014 but its pictures. */
export function spinDraft(): Draft {
  const motion = spinMotion();
  const survey = spinSurvey(motion);
  const plan = reconstruction(survey, motion);
  const incidentAt = '2026-10-17T13:20:00-08:00';
  const shotFiles = SPIN_SHOTS.map((shot) => [photographFile(shot), shot.title] as const);
  const base = { packaging: null, seal: null, sensitivity: 'ordinary', parent: null } as const;
  return {
    folder: 'spin-on-a-bend',
    scene: {
      number: '2026-014',
      title: 'Spin on Marl Lane bend',
      kind: 'road',
      place: { name: 'Marl Lane, bend at the old kiln (invented)', ...ORIGIN, utcOffset: '-08:00' },
      incidentAt,
      bearingOfX: BEARING_OF_X,
      frame:
        'Local grid of the survey: x along the tangent of the bend, y to its left, heights as levelled.',
      brief: {
        instructedBy: 'A. Thorne',
        instructedAt: '2026-10-19T09:30:00-08:00',
        dueAt: '2026-12-18T17:00:00-08:00',
        background:
          'Traffic keeps to the left. Vehicle 1 entered the left-hand bend, spun counter-clockwise across ' +
          'the centre line and came to rest in the opposite lane. A cyclist riding the other way left the ' +
          'road to avoid it. The claimant says that vehicle 1 was far too fast; the defendant says that it ' +
          'spun only because the brakes locked.',
        questions: [
          { number: 1, text: 'How fast was vehicle 1 when its wheels locked?' },
          { number: 2, text: 'Was it already turning, and how quickly, before the wheels locked?' },
          {
            number: 3,
            text: 'Which wheels had crossed the centre line, and how were they moving, at gap 3?',
          },
        ],
        cautions: ['Live carriageway: survey and photographs under a lane closure.'],
      },
      parties: [
        { id: 'claimant', name: 'The claimant, cyclist', role: 'claimant', attorney: 'A. Thorne' },
        {
          id: 'defendant',
          name: 'The defendant, driver of vehicle 1',
          role: 'defendant',
          attorney: 'B. Castellane',
        },
      ],
      people: [
        { name: 'E. Varo', role: 'lead-investigator' },
        { name: 'J. Oduya', role: 'investigator' },
        { name: 'S. Lindqvist', role: 'technical-reviewer' },
        { name: 'R. Amadi', role: 'evidence-custodian' },
      ],
      custody: [
        ...sealedItemCustody({
          exhibit: EXHIBIT.recorder,
          collectedAt: '2026-10-17T16:40:00-08:00',
          collectedBy: 'J. Oduya',
          custodian: 'R. Amadi',
          receivedAt: '2026-10-17T18:15:00-08:00',
          examiner: 'J. Oduya',
          examinedAt: '2026-10-20T10:05:00-08:00',
          seals: ['QL 204417', 'QL 204431'],
          from: 'Marl Lane bend',
        }),
        ...sealedItemCustody({
          exhibit: EXHIBIT.tyre,
          collectedAt: '2026-10-17T16:55:00-08:00',
          collectedBy: 'E. Varo',
          custodian: 'R. Amadi',
          receivedAt: '2026-10-17T18:20:00-08:00',
          examiner: 'E. Varo',
          examinedAt: '2026-10-21T13:30:00-08:00',
          seals: ['QL 204418', 'QL 204433'],
          from: 'Marl Lane bend',
        }),
      ],
      survey: {
        file: 'survey.csv',
        lengthUnit: 'm',
        delimiter: ',',
        columns: {
          id: SPIN_COLUMNS[0],
          code: SPIN_COLUMNS[1],
          string: SPIN_COLUMNS[2],
          sequence: SPIN_COLUMNS[3],
          x: SPIN_COLUMNS[4],
          y: SPIN_COLUMNS[5],
          height: SPIN_COLUMNS[6],
          sigmaX: SPIN_COLUMNS[7],
          sigmaY: SPIN_COLUMNS[8],
          remark: SPIN_COLUMNS[10],
        },
        sigmaUnit: 'mm',
        instrument: 'Total station QS 2, 2" angles, prism pole (invented instrument)',
        surveyedBy: 'E. Varo',
        surveyedAt: '2026-10-17T15:10:00-08:00',
        codes: {
          CP: 'control point',
          RE: 'road edge',
          LM: 'line marking',
          YM: 'yaw mark, point on a trace',
          YG: 'yaw mark, begin or gap that fixes a station',
          POR: 'point of rest, wheel of the vehicle',
          DB: 'debris',
          FL: 'fluid',
        },
        controlPoints: Object.keys(CONTROL),
        lines: survey.lines,
      },
      reconstruction: plan,
    },
    exhibits: [
      {
        ...base,
        number: EXHIBIT.survey,
        kind: 'survey-data',
        title: 'Total-station survey of the scene',
        description: 'Control, road lines, four tyre marks with five gaps, point of rest, debris.',
        source: 'Marl Lane bend, measured before vehicle 1 was moved',
        collectedBy: 'E. Varo',
        collectedAt: '2026-10-17T15:10:00-08:00',
        condition: 'Complete export, 1 file',
        location: 'Digital store',
        files: [['survey.csv', 'Survey export']],
      },
      {
        ...base,
        number: EXHIBIT.recorder,
        kind: 'physical-item',
        title: 'Motion recorder from vehicle 1',
        description:
          'Recorder unit with bracket and cut loom, taken from beneath the left front seat.',
        source: 'Vehicle 1 at its point of rest',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-10-17T16:40:00-08:00',
        condition: 'Housing scratched, connector intact',
        packaging: 'Antistatic bag in a rigid box',
        seal: 'QL 204431',
        location: 'Exhibit store, shelf 3',
        files: [],
      },
      {
        ...base,
        number: EXHIBIT.recorderData,
        kind: 'recorder-data',
        title: 'Data read out from the motion recorder',
        description:
          'Time, speed over ground of the centre of gravity, yaw rate, brake pressure, 20 Hz.',
        source: 'Read out from exhibit 2 with a write blocker',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-10-20T10:40:00-08:00',
        condition: 'Read twice, identical',
        parent: EXHIBIT.recorder,
        location: 'Digital store',
        files: [['recorder.csv', 'Recorder read-out']],
      },
      {
        ...base,
        number: EXHIBIT.photographs,
        kind: 'photograph-set',
        title: 'Photographs of the scene',
        description:
          'Six photographs with number boards at the marks and targets on the control points.',
        source: 'Marl Lane bend',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-10-17T15:02:00-08:00',
        condition: 'Originals from the camera card',
        location: 'Digital store',
        files: shotFiles,
      },
      {
        ...base,
        number: EXHIBIT.vehicle,
        kind: 'document',
        title: 'Dimensions of vehicle 1',
        description:
          'Wheel contact points from the centre of gravity, mass on four scales, outline.',
        source: 'Measured in the laboratory hall',
        collectedBy: 'J. Oduya',
        collectedAt: '2026-10-22T11:00:00-08:00',
        condition: 'Complete',
        location: 'Digital store',
        files: [['vehicle.json', 'Dimensions']],
      },
      {
        ...base,
        number: EXHIBIT.sketch,
        kind: 'document',
        title: 'Scene sketch',
        description: 'Field sketch with control points, traces, gaps and point of rest.',
        source: 'Drawn at the scene',
        collectedBy: 'E. Varo',
        collectedAt: '2026-10-17T16:20:00-08:00',
        condition: '1 page',
        location: 'Digital store',
        files: [['scene-sketch.pdf', 'Scene sketch']],
      },
      {
        ...base,
        number: EXHIBIT.tyre,
        kind: 'sample',
        title: 'Tread sample, right rear tyre',
        description: 'Section of tread with a flat worn across the ribs.',
        source: 'Vehicle 1 at its point of rest',
        collectedBy: 'E. Varo',
        collectedAt: '2026-10-17T16:55:00-08:00',
        condition: 'Dry, no loose cord',
        packaging: 'Paper bag',
        seal: 'QL 204433',
        location: 'Exhibit store, shelf 3',
        files: [],
      },
    ],
    texts: {
      'survey.csv': totalStationCsv(survey.book.rows),
      'recorder.csv': recorderCsv(recorder(motion)),
    },
    documents: {
      'vehicle.json': {
        format: 'centrode.demo-body/1',
        notice: NOTICE,
        bodies: [carBody()],
        joints: [],
      },
      'truth.json': spinTruth(motion),
    },
    shots: [...SPIN_SHOTS],
    visible: Object.entries(CONTROL).map(([survey_, [x, y]]) => ({
      survey: survey_,
      point: [x, y, 0],
    })),
    whereabouts: whereaboutsAt(ORIGIN, BEARING_OF_X),
    stages: () => spinStages(motion),
    sketch: spinSketch(survey, motion, BEARING_OF_X),
    sketchFile: 'scene-sketch.pdf',
  };
}
