import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';

const require = createRequire(import.meta.url);

const faces = [
  ['Merriweather', 700, '@fontsource/merriweather/files/merriweather-latin-700-normal.woff2'],
  [
    'Atkinson Hyperlegible Next',
    400,
    '@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-400-normal.woff2',
  ],
  [
    'Atkinson Hyperlegible Next',
    700,
    '@fontsource/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-700-normal.woff2',
  ],
  [
    'Atkinson Hyperlegible Mono',
    400,
    '@fontsource/atkinson-hyperlegible-mono/files/atkinson-hyperlegible-mono-latin-400-normal.woff2',
  ],
] as const;

/** The type faces travel inside the page, so that it reads the same on any machine, off any net. */
function fontFaces(): string {
  return faces
    .map(([family, weight, file]) => {
      const bytes = readFileSync(require.resolve(file)).toString('base64');
      return `@font-face{font-family:'${family}';font-weight:${weight};src:url(data:font/woff2;base64,${bytes}) format('woff2')}`;
    })
    .join('\n');
}

const rules = `
:root{--paper:#FBFAF6;--sheet:#FFFFFF;--ink:#1B2733;--muted:#56636E;--line:#DAD6CA;--spruce:#17595A;--chalk:#B9501F;--wash:#EEF3F1}
@media (prefers-color-scheme:dark){:root{--paper:#12181D;--sheet:#182027;--ink:#E8E4DA;--muted:#9AA7B0;--line:#2C3740;--spruce:#6FC0B8;--chalk:#F0915A;--wash:#1C2A2B}}
*{box-sizing:border-box}
body{margin:0;background:var(--paper);color:var(--ink);font:16px/1.5 'Atkinson Hyperlegible Next',sans-serif;font-variant-numeric:tabular-nums}
.band{padding:10px 20px;border-bottom:1px solid var(--line);color:var(--muted);font-size:14px;display:flex;gap:6px 24px;flex-wrap:wrap}
.band strong{color:var(--ink)}
main{max-width:980px;margin:24px auto;padding:36px 46px;background:var(--sheet);border:1px solid var(--line)}
h1,h2{font-family:Merriweather,serif;font-weight:700;line-height:1.3}
h1{font-size:27px;margin:0 0 6px}h2{font-size:19px;margin:38px 0 10px}
.lead{color:var(--muted);margin:0 0 22px}
nav{display:flex;flex-wrap:wrap;gap:4px 18px;padding:10px 0;border-top:1px solid var(--line);border-bottom:1px solid var(--line)}
a{color:var(--spruce)}
.answer{border-left:3px solid var(--spruce);padding:0 0 0 16px;margin:16px 0}
.answer h3{font:700 16px/1.4 Merriweather,serif;margin:0 0 4px}.answer p{margin:0;white-space:pre-line}
.prose{white-space:pre-line}
.scroll{overflow-x:auto}
table{border-collapse:collapse;width:100%;font-size:14.5px}
th{font-weight:400;color:var(--muted);text-align:left;font-size:13px}
td,th{padding:6px 12px 6px 0;border-bottom:1px solid var(--line);vertical-align:top}
td.n,th.n{text-align:right}td.n,.t{white-space:nowrap}
small{color:var(--muted);font-size:13px}
code,pre,.mono{font-family:'Atkinson Hyperlegible Mono',monospace;font-size:13px;overflow-wrap:anywhere}
pre{background:var(--wash);padding:12px 14px;overflow-x:auto;white-space:pre-wrap}
summary{cursor:pointer;color:var(--spruce);margin:10px 0}
figure{margin:0}figure svg{width:100%;height:auto;border:1px solid var(--line);background:#FFFFFF}
figcaption{color:var(--muted);font-size:13px}
.caution{border-left:3px solid var(--chalk);padding-left:16px}
:focus-visible{outline:2px solid var(--chalk);outline-offset:2px}
@media (max-width:700px){main{padding:22px 16px;margin:0;border:0}}
@media print{body{background:#FFFFFF}main{border:0;margin:0;padding:0;max-width:none}nav{display:none}h2{break-after:avoid}tr{break-inside:avoid}}
`;

let sheet: string | undefined;

/** The whole style sheet of the reader; it never changes while the program runs. */
export function readerStyle(): string {
  sheet ??= fontFaces() + rules;
  return sheet;
}
