import { type Draft, type Shot, photographFile } from './draft';
import { type Files, fileEntry, jsonFile } from './folder';
import { type Vec3, lookFrom, project } from './picture/camera';
import { photograph } from './picture/photograph';
import { type Stage, inSight } from './picture/render';
import { NOTICE, type PhotographEntry, type Scene } from './scene';
import { sketchPdf } from './sketch';

/** Makes every file of a scene. Photographs take seconds each; everything else is instant. */
export async function buildScene(draft: Draft): Promise<Files> {
  const files: Files = new Map();
  for (const [path, text] of Object.entries(draft.texts)) files.set(path, Buffer.from(text));
  for (const [path, value] of Object.entries(draft.documents)) {
    files.set(path, await jsonFile(value));
  }
  files.set(draft.sketchFile, await sketchPdf(draft.sketch));
  const stages = await draft.stages();
  const photographs: PhotographEntry[] = [];
  for (const shot of draft.shots) {
    const entry = photographEntry(draft, shot, stages[shot.stage]);
    photographs.push(entry);
    files.set(entry.file, await take(draft, shot, stages[shot.stage]));
  }
  const { number, title, kind, ...rest } = draft.scene;
  const scene: Scene = {
    format: 'centrode.demo-scene/1',
    notice: NOTICE,
    number,
    title,
    kind,
    ...rest,
    exhibits: draft.exhibits.map((exhibit) => ({
      ...exhibit,
      files: exhibit.files.map(([path, name]) => fileEntry(files, path, name)),
    })),
    photographs,
  };
  files.set('scene.json', await jsonFile(scene));
  return files;
}

function photographEntry(draft: Draft, shot: Shot, stage: Stage): PhotographEntry {
  const camera = lookFrom(shot.camera);
  const seen = draft.visible.flatMap(({ survey, point }) => {
    const pixel = project(camera, point);
    const clear = pixel !== null && inSight(stage, shot.camera.eye, lifted(point));
    return clear ? [{ survey, pixel: [tenth(pixel[0]), tenth(pixel[1])] as const }] : [];
  });
  return {
    file: photographFile(shot),
    number: shot.number,
    title: shot.title,
    takenAt: shot.takenAt,
    takenBy: shot.takenBy,
    sensitive: shot.sensitive,
    visible: shot.stage === 'main' ? seen : [],
  };
}

const tenth = (value: number): number => Math.round(value * 10) / 10;
const lifted = ([x, y, z]: Vec3): Vec3 => [x, y, z + 0.03];

/** Writes the local time the way a camera does. */
export function cameraTime(iso: string): { takenAt: string; utcOffset: string } {
  const [date, rest] = iso.split('T');
  return { takenAt: `${date.replaceAll('-', ':')} ${rest.slice(0, 8)}`, utcOffset: rest.slice(8) };
}

function take(draft: Draft, shot: Shot, stage: Stage): Promise<Buffer> {
  return photograph(stage, lookFrom(shot.camera), {
    ...cameraTime(shot.takenAt),
    ...draft.whereabouts(shot.camera.eye),
    seed: shot.number + 1000,
  });
}
