import { moveStage, readCase } from '#shared/contracts/cases';
import { releaseCase } from '#shared/contracts/disclosure';
import { listExhibits } from '#shared/contracts/exhibits';
import { editFindings, readFindings } from '#shared/contracts/findings';
import type { Colleagues } from './demo';
import type { Scene } from './scene';

/** Writes findings for the sample and releases them to its first party, so that an attorney has something to read. */
export async function releaseDemo(
  scene: Scene,
  colleagues: Colleagues,
  leadName: string,
  caseId: string,
  hashes: ReadonlyMap<string, string>,
): Promise<void> {
  const investigator = await colleagues.named(leadName);
  const [body] = scene.reconstruction.bodies;
  const figures = [...hashes.values()]
    .slice(0, 3)
    .flatMap((computation, index) => [
      { computation, quantity: 'speed' as const, body: body.id, point: 'G' },
      ...(index === 1
        ? [{ computation, quantity: 'angular-velocity' as const, body: body.id, point: null }]
        : []),
    ]);
  const before = await investigator.call(readFindings, { params: { caseId } });
  await investigator.call(editFindings, {
    params: { caseId },
    ifMatch: before.version,
    body: {
      answers: scene.brief.questions.map(({ number }) => ({
        questionNumber: number,
        text: 'The key figures below give the answer, with the range in which it lies at 95 % coverage.',
      })),
      figures,
      dependsOn:
        'The speed that the recorder kept, and the directions of the four tyre marks at each station.',
      against: 'The recorder was not tested on a reference track after the event.',
    },
  });
  const { items } = await investigator.call(listExhibits, { params: { caseId } });
  const file = await investigator.call(readCase, { params: { caseId } });
  await investigator.call(releaseCase, {
    params: { caseId },
    body: {
      partyId: file.parties[0].id,
      exhibits: items.filter((item) => !item.sensitive).map((item) => item.number),
      withheld: items
        .filter((item) => item.sensitive)
        .map((item) => ({
          exhibit: item.number,
          reason: 'sensitive' as const,
          explanation: 'Shows personal traces; it can be viewed at the laboratory.',
        })),
      password: colleagues.password,
    },
  });
  const after = await investigator.call(readCase, { params: { caseId } });
  await investigator.call(moveStage, {
    params: { caseId },
    body: { stage: 'disclosed', reason: 'Released to the first party.' },
    ifMatch: after.version,
  });
}
