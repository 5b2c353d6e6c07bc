import type { Account, AccountRole } from '#shared/contracts/accounts';
import type { CaseFile, CaseSummary } from '#shared/contracts/cases';
import type { Exhibit } from '#shared/contracts/exhibits';
import type { Figure, Findings } from '#shared/contracts/findings';

/** Invented records for component specs; each takes what the spec is about. */
let last = 0;
export const newId = (): string =>
  `0190b6f4-0000-7000-8000-${String((last += 1)).padStart(12, '0')}`;

export const accountOf = (role: AccountRole, name = 'E. Varo'): Account => ({
  id: newId(),
  name,
  email: 'someone@quellmere.example',
  role,
  active: true,
});

export const caseSummaryOf = (some: Partial<CaseSummary> = {}): CaseSummary => ({
  id: newId(),
  number: '2026-014',
  title: 'Spin on Marl Lane bend',
  kind: 'road, one vehicle',
  stage: 'in-examination',
  leadInvestigator: 'E. Varo',
  dueOn: '2026-12-18',
  openedAt: '2026-10-05T08:00:00.000Z',
  ...some,
});

export const caseFileOf = (some: Partial<CaseFile> = {}): CaseFile => ({
  ...caseSummaryOf(),
  kind: 'road, one vehicle',
  commissionedBy: 'Marlow and partners',
  jurisdiction: 'Quellmere county court',
  incidentOn: '2026-10-03',
  place: 'Marl Lane',
  circumstances: 'A car left the road.',
  speedUnit: 'km/h',
  xAxisBearing: null,
  version: 4,
  parties: [
    { id: newId(), name: 'H. Marlow', role: 'claimant' },
    { id: newId(), name: 'Tarn Haulage', role: 'defendant' },
  ],
  questions: [
    { id: newId(), number: 1, text: 'How fast was the car going?' },
    { id: newId(), number: 2, text: 'Which wheel struck the kerb?' },
  ],
  assignments: [],
  may: { work: true, custody: true, direct: true, assign: true },
  counts: { exhibits: 2, marks: 96, computations: 1, releases: 0 },
  ...some,
});

export const computationHash = 'ab'.repeat(32);

export const figureOf = (some: Partial<Figure> = {}): Figure => ({
  computation: computationHash,
  quantity: 'speed',
  body: 'car',
  point: 'G',
  branch: 0,
  title: 'Speed',
  pointName: 'centre of gravity, car',
  stationName: 'first mark',
  value: 71.2 / 3.6,
  low: 67.1 / 3.6,
  high: 75.3 / 3.6,
  ...some,
});

export const findingsOf = (some: Partial<Findings> = {}): Findings => ({
  answers: [
    { questionNumber: 1, question: 'How fast was the car going?', text: 'About 71 km/h.' },
    { questionNumber: 2, question: 'Which wheel struck the kerb?', text: '' },
  ],
  figures: [figureOf()],
  dependsOn: 'The grip of the road.',
  against: '',
  version: 3,
  changedAt: '2026-11-28T10:15:00.000Z',
  ...some,
});

export const exhibitOf = (number: string, some: Partial<Exhibit> = {}): Exhibit => ({
  id: newId(),
  number,
  kind: 'photographs',
  description: `Exhibit ${number}`,
  source: '',
  collectedBy: '',
  collectedAt: null,
  collectedPlace: '',
  condition: '',
  packaging: '',
  sealNumber: '',
  sensitive: false,
  parentNumber: null,
  registeredAt: '2026-10-06T09:00:00.000Z',
  version: 1,
  custody: { holderId: null, holder: null, location: '', sealNumber: '', pending: null },
  files: [],
  ...some,
});
