import type { ArchiveSource } from './archive-source';
import { ledgerHead } from '#shared/contracts/custody';
import { cautions } from './cautions';

/** How to check the archive with ordinary tools; on the page and in README.txt. */
export function checkText(source: ArchiveSource, folder: string): string {
  const head = ledgerHead.parse(JSON.parse(source.heads.at(-1) ?? ''));
  return `Open a terminal in the folder "${folder}".

1. No file was changed since the archive was made (a standard bag, RFC 8493, BagIt 1.0):
     sha256sum -c manifest-sha256.txt
     sha512sum -c manifest-sha512.txt
     sha256sum -c tagmanifest-sha256.txt
   On macOS "shasum -a 256 -c" and "shasum -a 512 -c"; any BagIt validator does it too.

2. The custody ledger is the one that the laboratory signed (Ed25519):
     openssl pkeyutl -verify -pubin -inkey data/custody/public-key.pem -rawin \\
       -in data/custody/head-signed-bytes.json -sigfile data/custody/head.sig
   Ask the laboratory, by another way than the one this archive came, for the id of its key.
   It must be ${head.keyId}.

3. The signature covers the last event of the ledger, and that event covers this release.
   The two commands give "${head.hash}", which stands in head-signed-bytes.json,
   and the number that stands in the note of that event:
     tail -n 1 data/custody/ledger.jsonl | tr -d '\\n' | sha256sum
     sha256sum data/release.json

4. All of that, the chain of the ledger, the computations and the tables, in one go
   (needs Node.js 20 or later, nothing else; no network):
     node data/tools/verify.mjs .

5. Every number again from the measurements:
     node data/tools/recompute.mjs .
   It says of each computation whether the result is identical, and if not, how it differs.
`;
}

/** The plain text that greets whoever opens the folder without a browser. */
export function readmeText(source: ArchiveSource, folder: string): string {
  const { summary } = source.snapshot;
  return `${summary.title}
Case ${summary.caseNumber}, release ${summary.releaseNumber}, ${summary.releasedAt.slice(0, 10)}
Released by ${summary.laboratory} to ${summary.party}.

WHAT IS HERE
  index.html          everything to be read in a browser: answers, figures, plan, tables
  release.json        what was released, frozen; the ledger names its SHA-256
  velocities.csv      every computed velocity and acceleration with its 95 % range
  computations/       each computation, complete, named by the SHA-256 of its content; schemas/
  survey/             the marks as a table, as GeoJSON, and on a scale plan (print on A3 at 100 %)
  exhibits/           released originals under made names; files.csv has their own names
  withheld.csv        exhibits that were not released, each with the reason
  custody/            the ledger, its signed heads and the key to check them
  tools/              two programs, one file each, for plain Node.js

HOW TO CHECK
${checkText(source, folder)}
CAUTIONS
${[summary.caution, ...cautions].map((text) => `- ${text}`).join('\n')}
`;
}
