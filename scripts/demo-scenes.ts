import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { badInput } from './demo/bad-input';
import { buildScene } from './demo/build';
import { writeFolder } from './demo/folder';
import { jackKnifeDraft } from './demo/jack-knife-scene';
import { pressDraft } from './demo/press-scene';
import { spinDraft } from './demo/spin-scene';

/**
 * Writes the demo world's scenes into evidence-samples, the same bytes every time.
 * `npm run demo:scenes` for all, `npm run demo:scenes -- press bad-input` for some.
 */
const TARGET = join(import.meta.dirname, '..', 'evidence-samples');
const PHOTOGRAPH = join(TARGET, 'spin-on-a-bend', 'photographs', 'photograph-02.jpg');

const wanted = process.argv.slice(2);
const isWanted = (folder: string): boolean => wanted.length === 0 || wanted.includes(folder);
const report = (folder: string, files: number): boolean =>
  process.stdout.write(`${folder}: ${files} files\n`);

for (const draft of [spinDraft(), jackKnifeDraft(), pressDraft()].filter((one) =>
  isWanted(one.folder),
)) {
  const files = await buildScene(draft);
  await writeFolder(join(TARGET, draft.folder), files);
  report(draft.folder, files.size);
}
if (isWanted('bad-input')) {
  const files = await badInput(await readFile(PHOTOGRAPH));
  await writeFolder(join(TARGET, 'bad-input'), files);
  report('bad-input', files.size);
}
