import { canonicalText, sha256Hex } from '../ledger/canonical';
import type { ArchiveSource } from './archive-source';
import { planCaption } from './cautions';
import { checkText, readmeText } from './check-text';
import { madeEntry, type BagEntry } from './entry';
import { exhibitEntries } from './exhibit-files';
import { ledgerEntries } from './ledger-files';
import { planSvg } from './plan';
import { readerPage } from './reader';
import { marksCsv, marksGeoJson } from './survey-files';
import { velocitiesCsv } from './velocities';
import { withheldCsv } from './withheld';

/**
 * Everything under `data/`, in order.
 *
 * @throws RangeError when a computation's text is not the one that its hash names
 */
export function payloadOf(source: ArchiveSource, folder: string): BagEntry[] {
  const { snapshot } = source;
  const texts = new Map(source.computations.map(({ hash, text }) => [hash, text]));
  const textOf = (hash: string): string => {
    const text = texts.get(hash);
    if (text === undefined) throw new RangeError(`The computation ${hash} is not at hand.`);
    if (sha256Hex(text) !== hash) throw new RangeError(`The computation ${hash} was changed.`);
    return text;
  };
  if (canonicalText(snapshot) !== source.snapshotText) {
    throw new RangeError('The text of the release is not the canonical one.');
  }
  return [
    madeEntry('data/index.html', readerPage(source, checkText(source, folder))),
    madeEntry('data/README.txt', readmeText(source, folder)),
    madeEntry('data/release.json', source.snapshotText),
    madeEntry('data/withheld.csv', withheldCsv(snapshot.withheld)),
    madeEntry('data/velocities.csv', velocitiesCsv(snapshot.computations, textOf)),
    ...snapshot.computations.map(({ hash }) =>
      madeEntry(`data/computations/${hash}.json`, textOf(hash)),
    ),
    ...Object.entries(source.schemas)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, text]) => madeEntry(`data/computations/schemas/${name}`, text)),
    ...ledgerEntries(source),
    ...exhibitEntries(source),
    madeEntry('data/survey/marks.csv', marksCsv(snapshot.marks)),
    madeEntry('data/survey/marks.geojson', marksGeoJson(snapshot.marks)),
    madeEntry(
      'data/survey/plan.svg',
      planSvg({
        marks: snapshot.marks,
        title: `${snapshot.summary.caseNumber}: marks of the survey`,
        caption: planCaption(snapshot.summary),
        xAxisBearing: snapshot.xAxisBearing,
      }),
    ),
    madeEntry('data/tools/recompute.mjs', source.tools.recompute),
    madeEntry('data/tools/verify.mjs', source.tools.verify),
  ];
}
