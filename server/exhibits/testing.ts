import sharp from 'sharp';
import type { Exhibit, ExhibitEntry, ExhibitFile } from '#shared/contracts/exhibits';
import type { TestPerson } from '../testing/api';

/** Registers an exhibit as this person, who then holds it. */
export async function registerTestExhibit(
  person: TestPerson,
  caseId: string,
  over: Partial<ExhibitEntry> = {},
): Promise<Exhibit> {
  const entry: ExhibitEntry = { kind: 'physical item', description: 'Left rear tyre', ...over };
  const answer = await person.post(`/api/cases/${caseId}/exhibits`, entry).expect(201);
  return answer.body as Exhibit;
}

/** Sends a file as a browser does; the caller says what to expect. */
export function sendTestFile(
  person: TestPerson,
  caseId: string,
  exhibitId: string,
  content: Buffer,
  filename: string,
  fields: Record<string, string> = {},
) {
  const test = person
    .call('post', `/api/cases/${caseId}/exhibits/${exhibitId}/files`)
    // What the sender calls it is a lie on purpose: it must not matter.
    .attach('file', content, { filename, contentType: 'text/html' });
  for (const [name, value] of Object.entries(fields)) test.field(name, value);
  return test;
}

export async function takeInTestFile(
  ...sending: Parameters<typeof sendTestFile>
): Promise<ExhibitFile> {
  return (await sendTestFile(...sending).expect(201)).body as ExhibitFile;
}

interface CameraTags {
  readonly taken?: string;
  readonly offset?: string;
  readonly changed?: string;
  readonly software?: string;
  /** Degrees north and east. */
  readonly position?: readonly [number, number];
}

/** A picture as an invented camera would write it; `seed` makes its content its own. */
export function testPicture(seed = 1, tags: CameraTags = {}, width = 640): Promise<Buffer> {
  const rational = (degrees: number): string => {
    const whole = Math.abs(degrees);
    const minutes = (whole % 1) * 60;
    return `${Math.floor(whole)}/1 ${Math.floor(minutes)}/1 ${Math.round((minutes % 1) * 60 * 1000)}/1000`;
  };
  const [north, east] = tags.position ?? [0, 0];
  return sharp({
    create: {
      width,
      height: Math.round(width * 0.75),
      channels: 3,
      background: '#556677',
      noise: { type: 'gaussian', mean: 100 + (seed % 50), sigma: 30 },
    },
  })
    .jpeg({ quality: 80 })
    .withExif({
      IFD0: {
        Make: 'Invented',
        Model: `Camera ${seed}`,
        ...(tags.software === undefined ? {} : { Software: tags.software }),
        ...(tags.changed === undefined ? {} : { DateTime: tags.changed }),
      },
      IFD2: {
        ...(tags.taken === undefined ? {} : { DateTimeOriginal: tags.taken }),
        ...(tags.offset === undefined ? {} : { OffsetTimeOriginal: tags.offset }),
      },
      ...(tags.position === undefined
        ? {}
        : {
            IFD3: {
              GPSLatitudeRef: north < 0 ? 'S' : 'N',
              GPSLatitude: rational(north),
              GPSLongitudeRef: east < 0 ? 'W' : 'E',
              GPSLongitude: rational(east),
            },
          }),
    })
    .toBuffer();
}
