import * as z from 'zod';

const vector = z.tuple([z.number(), z.number()]);
const pointRef = z.object({ body: z.string(), point: z.string() });

/** What the seeder reads of a `scene.json` in evidence-samples; the file holds more than this. */
export const scene = z.object({
  format: z.literal('centrode.demo-scene/1'),
  number: z.string(),
  title: z.string(),
  kind: z.enum(['road', 'machine']),
  place: z.object({ name: z.string() }),
  incidentAt: z.string(),
  /** Clockwise from north, degrees. */
  bearingOfX: z.number().nullable(),
  brief: z.object({
    instructedBy: z.string(),
    dueAt: z.string(),
    background: z.string(),
    questions: z.array(z.object({ number: z.number(), text: z.string() })),
  }),
  parties: z.array(
    z.object({ id: z.string(), name: z.string(), role: z.string(), attorney: z.string() }),
  ),
  people: z.array(
    z.object({
      name: z.string(),
      role: z.enum([
        'lead-investigator',
        'investigator',
        'technical-reviewer',
        'evidence-custodian',
      ]),
    }),
  ),
  exhibits: z.array(
    z.object({
      number: z.number(),
      kind: z.string(),
      title: z.string(),
      description: z.string(),
      source: z.string(),
      collectedBy: z.string(),
      collectedAt: z.string(),
      condition: z.string(),
      packaging: z.string().nullable(),
      seal: z.string().nullable(),
      sensitivity: z.enum(['ordinary', 'sensitive']),
      parent: z.number().nullable(),
      location: z.string(),
      files: z.array(z.object({ path: z.string(), title: z.string() })),
    }),
  ),
  custody: z.array(
    z.object({
      exhibit: z.number(),
      kind: z.string(),
      at: z.string(),
      from: z.string().nullable(),
      to: z.string().nullable(),
      purpose: z.string(),
      sealAfter: z.string().nullable(),
      location: z.string(),
    }),
  ),
  survey: z.object({
    file: z.string(),
    lengthUnit: z.enum(['m', 'mm']),
    delimiter: z.enum([',', ';']),
    columns: z.object({
      id: z.string(),
      code: z.string(),
      string: z.string().nullable(),
      sequence: z.string().nullable(),
      x: z.string(),
      y: z.string(),
      height: z.string().nullable(),
      sigmaX: z.string(),
      sigmaY: z.string(),
      remark: z.string(),
    }),
    sigmaUnit: z.literal('mm'),
    codes: z.record(z.string(), z.string()),
  }),
  reconstruction: z.object({
    title: z.string(),
    assumption: z.string(),
    bodies: z.array(
      z.object({
        id: z.string(),
        name: z.string(),
        points: z.record(z.string(), z.object({ at: vector, sigma: vector, title: z.string() })),
        outline: z.array(vector),
      }),
    ),
    joints: z.array(
      z.object({
        id: z.string(),
        kind: z.enum(['pin', 'guide', 'wheel']),
        a: pointRef,
        b: pointRef.optional(),
        ground: z.literal(true).optional(),
        direction: z.number().optional(),
        radius: z.number().nullable().optional(),
        steer: z.number().optional(),
        stations: z.array(z.string()).optional(),
        /** Where a ground pin or a guide was measured, m. */
        at: vector.optional(),
        sigma: z.number().optional(),
      }),
    ),
    stations: z.array(
      z.object({
        id: z.string(),
        title: z.string(),
        marks: z.array(z.object({ survey: z.string(), body: z.string(), point: z.string() })),
        knowns: z.array(
          z.object({
            id: z.string(),
            title: z.string(),
            quantity: z.enum([
              'velocity',
              'acceleration',
              'angular-velocity',
              'angular-acceleration',
            ]),
            at: pointRef.optional(),
            body: z.string().optional(),
            value: z.number().optional(),
            magnitude: z.number().optional(),
            direction: z.number().optional(),
            components: vector.optional(),
            sigma: z
              .union([
                z.number(),
                z.object({ magnitude: z.number().optional(), direction: z.number().optional() }),
              ])
              .optional(),
          }),
        ),
      }),
    ),
  }),
});
export type Scene = z.infer<typeof scene>;
