import type { Brief, CaseFile } from '#shared/contracts/cases';
import { showValue } from '#shared/units/show-quantity';
import { showDay } from '../../ui/dates/dates';

export interface BriefField {
  readonly key: keyof Brief;
  readonly label: string;
  readonly show: (brief: Brief) => string;
}

const text =
  (key: 'title' | 'kind' | 'commissionedBy' | 'jurisdiction' | 'place' | 'circumstances') =>
  (brief: Brief): string =>
    brief[key] || '–';
const day =
  (key: 'incidentOn' | 'dueOn') =>
  (brief: Brief): string => {
    const value = brief[key];
    return value === null ? '–' : showDay(value);
  };

/** Every field of a brief, with its name and how its value reads. */
export const briefFields: readonly BriefField[] = [
  { key: 'title', label: 'Title', show: text('title') },
  { key: 'kind', label: 'Kind of incident', show: text('kind') },
  { key: 'circumstances', label: 'Circumstances', show: text('circumstances') },
  { key: 'commissionedBy', label: 'Commissioned by', show: text('commissionedBy') },
  { key: 'jurisdiction', label: 'Jurisdiction', show: text('jurisdiction') },
  { key: 'incidentOn', label: 'Day of the incident', show: day('incidentOn') },
  { key: 'place', label: 'Place', show: text('place') },
  { key: 'dueOn', label: 'Due on', show: day('dueOn') },
  { key: 'speedUnit', label: 'Speeds are shown in', show: (brief) => unitText(brief.speedUnit) },
  {
    key: 'xAxisBearing',
    label: 'Bearing of the scene’s x axis',
    show: ({ xAxisBearing }) =>
      xAxisBearing === null
        ? 'not set (machine, or not measured)'
        : showValue(xAxisBearing, '°', 5),
  },
];

const unitText = (unit: Brief['speedUnit']): string => (unit === 'm/s' ? 'm/s' : `${unit} and m/s`);

export function briefOf(file: CaseFile): Brief {
  return {
    title: file.title,
    kind: file.kind,
    commissionedBy: file.commissionedBy,
    jurisdiction: file.jurisdiction,
    incidentOn: file.incidentOn,
    place: file.place,
    circumstances: file.circumstances,
    dueOn: file.dueOn,
    speedUnit: file.speedUnit,
    xAxisBearing: file.xAxisBearing,
  };
}

/** The fields of `mine` that differ from `base`; nothing else is sent. */
export function changesOf(base: Brief, mine: Brief): Partial<Brief> {
  return Object.fromEntries(
    briefFields.filter(({ key }) => mine[key] !== base[key]).map(({ key }) => [key, mine[key]]),
  );
}
