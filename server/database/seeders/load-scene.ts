import { join } from 'node:path';
import {
  addParty,
  addQuestion,
  assign,
  moveStage,
  openCase,
  readCase,
  type CaseFile,
  type incidentKinds,
} from '#shared/contracts/cases';
import { answerHandOver, handOver, recordCustody } from '#shared/contracts/custody';
import {
  registerExhibit,
  type Exhibit,
  type ExhibitFile,
  type exhibitKinds,
} from '#shared/contracts/exhibits';
import { addReconstruction, recordComputation } from '#shared/contracts/motion';
import { importSurvey, listMarks, type Mark } from '#shared/contracts/survey';
import { CaseRecord } from '../models/case';
import type { Colleagues } from './demo';
import { releaseDemo } from './release-demo';
import type { Scene } from './scene';
import { reconstructionOf } from './scene-motion';
import { mappingOf } from './scene-survey';

type IncidentKind = (typeof incidentKinds)[number];

/** Brings one sample scene in as a case: opened, assigned, logged, measured, solved. */
export async function loadScene(
  folder: string,
  scene: Scene,
  colleagues: Colleagues,
): Promise<void> {
  const file = await openSceneCase(scene, colleagues);
  const caseId = file.id;
  const leadName = scene.people.find((person) => person.role === 'lead-investigator')?.name ?? '';
  const investigator = await colleagues.named(leadName);

  const exhibits = new Map<number, Exhibit>();
  const files = new Map<string, { exhibit: Exhibit; file: ExhibitFile }>();
  for (const item of scene.exhibits) {
    const exhibit = await investigator.call(registerExhibit, {
      params: { caseId },
      body: {
        kind: item.kind
          .replace('photograph-set', 'photographs')
          .replace('-', ' ') as (typeof exhibitKinds)[number],
        description: `${item.title}. ${item.description}`.slice(0, 1000),
        source: item.source,
        collectedBy: item.collectedBy,
        collectedAt: utc(item.collectedAt),
        collectedPlace: item.location,
        condition: item.condition,
        packaging: item.packaging ?? '',
        sealNumber: firstSeal(scene, item.number, item.seal),
        sensitive: item.sensitivity === 'sensitive',
        parentNumber: item.parent === null ? null : (exhibits.get(item.parent)?.number ?? null),
      },
    });
    exhibits.set(item.number, exhibit);
    for (const { path } of item.files) {
      const taken = await investigator.upload(caseId, exhibit.id, join(folder, path));
      files.set(path, { exhibit, file: taken });
    }
  }
  await keepCustody(scene, colleagues, caseId, exhibits, leadName);

  const survey = files.get(scene.survey.file);
  if (!survey) throw new Error(`${scene.title}: the survey file is no exhibit`);
  await investigator.call(importSurvey, {
    params: { caseId },
    body: {
      exhibitId: survey.exhibit.id,
      fileId: survey.file.id,
      mapping: mappingOf(scene),
      strict: true,
    },
  });
  const { items: marks } = await investigator.call(listMarks, { params: { caseId } });
  const hashes = await solve(scene, colleagues, leadName, caseId, marks);
  const current = await investigator.call(readCase, { params: { caseId } });
  await investigator.call(moveStage, {
    params: { caseId },
    body: { stage: 'in-examination', reason: 'Survey and exhibits are in.' },
    ifMatch: current.version,
  });
  if (scene.kind === 'road' && scene.reconstruction.bodies.length === 1) {
    await releaseDemo(scene, colleagues, leadName, caseId, hashes);
  }
}

async function openSceneCase(scene: Scene, colleagues: Colleagues): Promise<CaseFile> {
  const lead = await colleagues.named('M. Quellen');
  const kind: IncidentKind =
    scene.kind === 'machine'
      ? 'machine, linkage'
      : scene.reconstruction.bodies.length > 1
        ? 'road, articulated'
        : 'road, one vehicle';
  const opened = await lead.call(openCase, {
    body: {
      title: scene.title,
      kind,
      commissionedBy: scene.brief.instructedBy,
      incidentOn: scene.incidentAt.slice(0, 10),
      place: scene.place.name,
      circumstances: scene.brief.background,
      dueOn: scene.brief.dueAt.slice(0, 10),
      speedUnit: scene.kind === 'machine' ? 'm/s' : 'km/h',
      xAxisBearing: scene.bearingOfX === null ? null : (scene.bearingOfX * Math.PI) / 180,
    },
  });
  const caseId = opened.id;
  // The samples' papers and placards bear these numbers.
  await CaseRecord.update({ number: scene.number }, { where: { id: caseId } });
  for (const question of scene.brief.questions) {
    await lead.call(addQuestion, { params: { caseId }, body: { text: question.text } });
  }
  for (const person of scene.people) {
    await lead.call(assign, {
      params: { caseId },
      body: {
        accountId: colleagues.idOf(person.name),
        role: person.role,
        declaration: { conflict: false, statement: 'No connection with any party or witness.' },
      },
    });
  }
  for (const party of scene.parties) {
    const added = await lead.call(addParty, {
      params: { caseId },
      body: { name: party.name, role: party.role },
    });
    await lead.call(assign, {
      params: { caseId },
      body: {
        accountId: colleagues.idOf(party.attorney),
        role: 'attorney',
        partyId: added.id,
        declaration: { conflict: false, statement: `Acts for ${party.name}.` },
      },
    });
  }
  return lead.call(readCase, { params: { caseId } });
}

/**
 * Custody as the sample tells it. The demo is entered on one day, so each event is recorded now and
 * its note says when the paper record has it.
 */
async function keepCustody(
  scene: Scene,
  colleagues: Colleagues,
  caseId: string,
  exhibits: Map<number, Exhibit>,
  firstHolder: string,
): Promise<void> {
  const holders = new Map<number, string>();
  for (const entry of scene.custody) {
    const exhibit = exhibits.get(entry.exhibit);
    if (!exhibit) continue;
    const params = { caseId, exhibitId: exhibit.id };
    const holder = holders.get(entry.exhibit) ?? firstHolder;
    const person = await colleagues.named(holder);
    const { purpose, location, to, kind } = entry;
    const note = `Paper record: ${entry.at}.`;
    if (kind === 'handed-over' && to !== null && to !== holder) {
      const body = { toId: colleagues.idOf(to), purpose, location, note };
      const offered = await person.call(handOver, { params, body });
      const receiver = await colleagues.named(to);
      await receiver.call(answerHandOver, {
        params,
        body: {
          sequence: offered.event.sequence,
          answer: 'accepted',
          password: colleagues.password,
          condition: 'Packaging whole, seal as stated.',
          location,
        },
      });
      holders.set(entry.exhibit, to);
    } else if (kind === 'opened' || kind === 'sealed') {
      const sealNumber = entry.sealAfter ?? '';
      const body = { kind, purpose, location, sealNumber, note } as const;
      await person.call(recordCustody, { params, body });
    }
  }
}

/** The seal that an item bore when it came in. */
function firstSeal(scene: Scene, number: number, now: string | null): string {
  const collected = scene.custody.find((e) => e.exhibit === number && e.kind === 'collected');
  return collected?.sealAfter ?? now ?? '';
}

/** Records a computation for every station; returns their hashes by station. */
async function solve(
  scene: Scene,
  colleagues: Colleagues,
  leadName: string,
  caseId: string,
  marks: readonly Mark[],
): Promise<Map<string, string>> {
  const investigator = await colleagues.named(leadName);
  const document = reconstructionOf(scene, marks);
  const reconstruction = await investigator.call(addReconstruction, {
    params: { caseId },
    body: {
      name: scene.reconstruction.title.slice(0, 120),
      assumption: scene.reconstruction.assumption,
      document,
    },
  });
  const hashes = new Map<string, string>();
  for (const station of document.stations) {
    if (station.knowns.length === 0) continue;
    const recorded = await investigator.call(recordComputation, {
      params: { caseId, reconstructionId: reconstruction.id },
      body: { stationId: station.id, version: reconstruction.version },
    });
    hashes.set(station.id, recorded.hash);
  }
  return hashes;
}

/** A case that waits for the lead to assign it. */
export async function openUnassigned(colleagues: Colleagues): Promise<void> {
  const lead = await colleagues.named('M. Quellen');
  const opened = await lead.call(openCase, {
    body: {
      title: 'Junction of Mere and Coil Road',
      kind: 'road, two vehicles',
      commissionedBy: 'An invented insurer',
      place: 'Junction of Mere Road and Coil Road',
      dueOn: '2027-01-12',
    },
  });
  await CaseRecord.update({ number: '2026-016' }, { where: { id: opened.id } });
}

/** A time with an offset, as the API takes it. */
function utc(time: string): string {
  return new Date(time).toISOString();
}
