import type { ArchiveSource } from './archive-source';
import { escapeMarkup as e } from './escape';
import { listFiles } from './exhibit-files';
import { showRanged } from '#shared/units/show-quantity';
import type { UnitSymbol } from '#shared/units/units';
import type { Figure } from '#shared/contracts/findings';
import { eventOf } from './ledger-files';
import { planSvg } from './plan';
import { cautions, planCaption } from './cautions';
import { readerStyle } from './reader-style';
import { sourceOf } from './survey-files';

/** The page shows this many marks; all of them are in the table beside it. */
const mostMarks = 500;
/** More than these are folded away until asked for. */
const unfoldedMarks = 30;

const day = (moment: string) => moment.slice(0, 10);
/** Kept on one line. */
const whole = (text: string) => `<span class="t">${text}</span>`;
const minute = (moment: string) => whole(`${moment.slice(0, 10)} ${moment.slice(11, 16)} UTC`);

function table(head: readonly string[], rows: readonly (readonly string[])[], numbers = 0): string {
  const place = (i: number, of: number) => (i >= of - numbers ? ' class="n"' : '');
  const row = (cells: readonly string[]) =>
    `<tr>${cells.map((cell, i) => `<td${place(i, cells.length)}>${cell}</td>`).join('')}</tr>`;
  return (
    `<div class="scroll" tabindex="0" role="region" aria-label="Table: ${head.join(', ')}"><table><thead><tr>` +
    head.map((name, i) => `<th scope="col"${place(i, head.length)}>${name}</th>`).join('') +
    `</tr></thead><tbody>${rows.map(row).join('\n')}</tbody></table></div>`
  );
}

const link = (path: string, text: string) => `<a href="${e(path)}">${e(text)}</a>`;

function answers(source: ArchiveSource): string {
  return source.snapshot.summary.questions
    .map(
      ({ number, question, answer }) =>
        `<div class="answer"><h3>${number} ${e(question)}</h3><p>${e(answer)}</p></div>`,
    )
    .join('\n');
}

/** The unit for people first, the SI unit beside it. */
function unitsOf({ quantity }: Figure, speedUnit: UnitSymbol): UnitSymbol[] {
  if (quantity === 'speed') return [...new Set<UnitSymbol>([speedUnit, 'm/s'])];
  return quantity === 'acceleration' ? ['m/s²', 'g'] : ['°/s', 'rad/s'];
}

function figures(source: ArchiveSource): string {
  const { figures, speedUnit } = source.snapshot.summary;
  if (figures.length === 0) return '<p>No figures were released.</p>';
  return table(
    ['Figure', 'Which point, which moment', 'Computation', 'Value', '95 % range'],
    figures.map((figure) => {
      const texts = unitsOf(figure, speedUnit).map((unit) => showRanged(figure, unit));
      return [
        e(figure.title),
        `${e(figure.pointName)}, ${e(figure.stationName)}`,
        link(
          `computations/${figure.computation}.json`,
          `${figure.computation.slice(0, 12)}, solution ${figure.branch + 1}`,
        ),
        texts.map((text) => `${e(text.value)} ${e(text.unit)}`).join('<br>'),
        texts.map((text) => `${e(text.low)} to ${e(text.high)}`).join('<br>'),
      ];
    }),
    2,
  );
}

function marks(source: ArchiveSource): string {
  const all = source.snapshot.marks;
  const shown = all.slice(0, mostMarks);
  const cm = (variance: number) => (Math.sqrt(variance) * 100).toFixed(1);
  const note =
    shown.length < all.length
      ? `<p>The first ${shown.length} of ${all.length} marks; all are in the table file.</p>`
      : '';
  const open = all.length <= unfoldedMarks ? ' open' : '';
  return (
    `<details${open}><summary>${all.length} marks</summary>${note}` +
    table(
      ['Mark', 'Kind', 'Trace', 'Where from', 'x, m', 'y, m', 'u(x), cm', 'u(y), cm'],
      shown.map((mark) => [
        whole(e(mark.label)),
        mark.kind,
        mark.trace === null ? '' : e(`${mark.trace} ${mark.order ?? ''}`),
        e(sourceOf(mark)),
        mark.at[0].toFixed(3).replace('-', '−'),
        mark.at[1].toFixed(3).replace('-', '−'),
        cm(mark.covariance[0][0]),
        cm(mark.covariance[1][1]),
      ]),
      4,
    ) +
    '</details>'
  );
}

function exhibits(source: ArchiveSource): string {
  const files = listFiles(source.snapshot.exhibits);
  return table(
    ['Exhibit', 'Kind', 'Description', 'Files (SHA-256)'],
    source.snapshot.exhibits.map((exhibit) => [
      whole(e(exhibit.number)),
      exhibit.kind,
      e(exhibit.description) +
        (exhibit.source ? `<br><small>Source: ${e(exhibit.source)}</small>` : '') +
        (exhibit.sensitive ? '<br><strong>Sensitive: it may be distressing.</strong>' : ''),
      files
        .filter((each) => each.exhibit === exhibit)
        .map(
          ({ file, path }) =>
            `${link(path.slice('data/'.length), file.name)}<br><code>${file.sha256}</code>`,
        )
        .join('<br>') || 'none',
    ]),
  );
}

function withheld(source: ArchiveSource): string {
  const items = source.snapshot.withheld;
  if (items.length === 0) return '<p>Nothing was left out.</p>';
  return table(
    ['Exhibit', 'Reason', 'Explanation'],
    items.map((item) => [whole(e(item.exhibit)), item.reason, e(item.explanation)]),
  );
}

function custody(source: ArchiveSource): string {
  return table(
    ['No.', 'Recorded', 'Event', 'Exhibit', 'From, to', 'Seal', 'Where, why, note'],
    source.ledger.map((line) => {
      if (!('text' in line)) {
        return [String(line.sequence), '', 'withheld', whole(e(line.withheldExhibit)), '', '', ''];
      }
      const event = eventOf(line.text);
      return [
        String(event.sequence),
        `${minute(event.recordedAt)}<br><small>by ${e(event.recordedBy.name)}</small>`,
        event.kind + (event.refersTo === null ? '' : ` (of no. ${event.refersTo})`),
        whole(e(event.exhibit ?? 'whole case')),
        e([event.releasedBy, event.receivedBy].filter(Boolean).join(' to ')),
        e([event.sealBefore, event.sealAfter].filter(Boolean).join(' to ')),
        e([event.location, event.purpose, event.condition, event.note].filter(Boolean).join('; ')),
      ];
    }),
  );
}

function computations(source: ArchiveSource): string {
  return table(
    ['Computation (SHA-256)', 'Reconstruction', 'Station', 'Outcome', 'Recorded'],
    source.snapshot.computations.map((each) => [
      `<code>${link(`computations/${each.hash}.json`, each.hash)}</code>`,
      e(each.reconstruction) + (each.assumption ? `<br><small>${e(each.assumption)}</small>` : ''),
      e(each.station),
      e(each.status),
      `${minute(each.recordedAt)}<br><small>by ${e(each.recordedBy)}</small>`,
    ]),
  );
}

const sections: readonly [id: string, title: string][] = [
  ['answers', 'Answers'],
  ['figures', 'Key figures'],
  ['plan', 'Scale plan'],
  ['marks', 'Marks'],
  ['exhibits', 'Exhibits'],
  ['custody', 'Custody'],
  ['computations', 'Computations'],
  ['check', 'How to check'],
  ['cautions', 'Cautions'],
];

/**
 * The page that opens the archive: everything in it to be read, with no program of ours, no script,
 * no network and no other file needed.
 */
export function readerPage(source: ArchiveSource, checkText: string): string {
  const { summary, marks: all, xAxisBearing } = source.snapshot;
  const title = `${summary.title}, ${summary.caseNumber} release ${summary.releaseNumber}`;
  const plan = planSvg({
    marks: all,
    title: `${summary.caseNumber}: marks of the survey`,
    caption: planCaption(summary),
    xAxisBearing,
  });
  const heading = (id: string) =>
    `<h2 id="${id}">${sections.find(([each]) => each === id)?.[1] ?? ''}</h2>`;
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; font-src data:; base-uri 'none'; form-action 'none'">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<title>${e(title)}</title>
<style>${readerStyle()}</style>
</head>
<body>
<header class="band"><span>Released to <strong>${e(summary.party)}</strong></span><span>Case ${e(summary.caseNumber)}, release ${summary.releaseNumber}</span><span>${e(summary.laboratory)}, ${day(summary.releasedAt)}</span></header>
<main>
<h1>${e(summary.title)}</h1>
<p class="lead">Released by ${e(summary.laboratory)} to ${e(summary.party)} on ${minute(summary.releasedAt)}. Everything on this page stands in the files beside it and can be checked without the laboratory and without its programs.</p>
<nav aria-label="On this page">${sections.map(([id, name]) => `<a href="#${id}">${name}</a>`).join('')}</nav>
${heading('answers')}
${answers(source)}
${heading('figures')}
${figures(source)}
<h2>What these depend on most</h2>
<p class="prose">${e(summary.dependsOn) || 'Nothing was stated.'}</p>
<h2>Strongest points against</h2>
<p class="prose">${e(summary.against) || 'Nothing was stated.'}</p>
${heading('plan')}
<figure>${plan}<figcaption>For measuring, print <a href="survey/plan.svg">survey/plan.svg</a> on A3 at 100 % and check its scale bar first.</figcaption></figure>
${heading('marks')}
<p>u is the standard uncertainty. All marks with covariances and raw rows: <a href="survey/marks.csv">survey/marks.csv</a>, <a href="survey/marks.geojson">survey/marks.geojson</a>.</p>
${marks(source)}
${heading('exhibits')}
<p>Files carry made names in this archive; their own names are shown here and in <a href="exhibits/files.csv">exhibits/files.csv</a>. They are originals of other origin: open them with care, with programs that run nothing by themselves.</p>
${exhibits(source)}
<h2>Not released</h2>
${withheld(source)}
${heading('custody')}
<p>Each event holds the SHA-256 of the one before it, and the signed head holds that of the last. The exact texts: <a href="custody/ledger.jsonl">custody/ledger.jsonl</a>; as a table: <a href="custody/ledger.csv">custody/ledger.csv</a>. Of events of exhibits that were not released only place and hash are told.</p>
${custody(source)}
${heading('computations')}
<p>Each file holds the complete problem, the options and the result; its name is the SHA-256 of its content. Every velocity and acceleration with its range: <a href="velocities.csv">velocities.csv</a>. All recorded computations of the case are here, not only those that a figure rests on.</p>
${computations(source)}
${heading('check')}
<pre>${e(checkText)}</pre>
${heading('cautions')}
<div class="caution">${[summary.caution, ...cautions].map((text) => `<p>${e(text)}</p>`).join('\n')}</div>
</main>
<footer class="band"><span>Released to <strong>${e(summary.party)}</strong>, release ${summary.releaseNumber} of ${day(summary.releasedAt)}</span></footer>
</body>
</html>
`;
}
