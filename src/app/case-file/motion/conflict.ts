import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import type { Difference } from '../../ui/edit-conflict/edit-conflict';
import type { DraftContent } from './draft';

const lists = {
  bodies: 'Body',
  joints: 'Joint',
  stations: 'Station',
} as const;
type ListName = keyof typeof lists;

/** Each thing that stands differently in my draft and in what somebody else saved meanwhile. */
export function differencesOf(mine: DraftContent, theirs: DraftContent): Difference[] {
  const found: Difference[] = [];
  for (const [key, label] of [
    ['name', 'Name'],
    ['assumption', 'What it assumes'],
  ] as const) {
    if (mine[key] !== theirs[key]) {
      found.push({ key, label, mine: mine[key], theirs: theirs[key] });
    }
  }
  for (const list of Object.keys(lists) as ListName[]) {
    for (const id of idsOf(mine.document, theirs.document, list)) {
      const a = itemOf(mine.document, list, id);
      const b = itemOf(theirs.document, list, id);
      if (JSON.stringify(a) === JSON.stringify(b)) continue;
      found.push({
        key: `${list}.${id}`,
        label: `${lists[list]} ${nameOf(a ?? b)}`,
        mine: describe(a),
        theirs: describe(b),
      });
    }
  }
  return found;
}

/** What they saved, with those of my things that I keep. */
export function settle(
  mine: DraftContent,
  theirs: DraftContent,
  keep: readonly string[],
): DraftContent {
  const document = { ...theirs.document };
  for (const list of Object.keys(lists) as ListName[]) {
    const kept = keep
      .filter((key) => key.startsWith(`${list}.`))
      .map((k) => k.slice(list.length + 1));
    const items = idsOf(mine.document, theirs.document, list).flatMap((id) => {
      const item = itemOf(kept.includes(id) ? mine.document : theirs.document, list, id);
      return item === undefined ? [] : [item];
    });
    Object.assign(document, { [list]: items });
  }
  return {
    name: keep.includes('name') ? mine.name : theirs.name,
    assumption: keep.includes('assumption') ? mine.assumption : theirs.assumption,
    document,
  };
}

/** Theirs first, in their order, then what is mine alone. */
function idsOf(
  mine: ReconstructionDocument,
  theirs: ReconstructionDocument,
  list: ListName,
): string[] {
  return [...new Set([...theirs[list], ...mine[list]].map((item) => item.id))];
}

const itemOf = (document: ReconstructionDocument, list: ListName, id: string) =>
  (document[list] as readonly { id: string }[]).find((item) => item.id === id);

function nameOf(item: { id: string } | undefined): string {
  const { id = '', name = '' } = (item ?? {}) as { id?: string; name?: string };
  return name === '' ? id : `${id} ${name}`;
}

function describe(item: { id: string } | undefined): string {
  if (item === undefined) return 'not there';
  const parts = Object.entries(item).flatMap(([name, value]) => {
    if (name === 'id') return [];
    if (Array.isArray(value)) return [`${value.length} ${name}`];
    return typeof value === 'object' ? [] : [`${name} ${String(value)}`];
  });
  return parts.join(', ');
}
