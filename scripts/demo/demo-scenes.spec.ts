import { describe, expect, it } from '@jest/globals';
import exifr from 'exifr';
import sharp from 'sharp';
import { cameraTime } from './build';
import { jackKnifeMotion, UNIT } from './jack-knife-motion';
import { lookFrom, project } from './picture/camera';
import { exifOf } from './picture/photograph';
import { type BodyMotion, place, turn, velocityAt } from './plane-motion';
import { CONTACT, pressMotion } from './press-motion';
import { pressDraft } from './press-scene';
import { jackKnifeDraft } from './jack-knife-scene';
import { spinDraft } from './spin-scene';
import { CAR, GRAVITY, WHEELS, spinMotion } from './spin-motion';

const STEP = 1e-3;

/** Central differences of poses and velocities about a time, beside what the motion itself states. */
function differences(at: (time: number) => BodyMotion, time: number): readonly [number, number][] {
  const [before, now, after] = [at(time - STEP), at(time), at(time + STEP)];
  const slope = (value: (body: BodyMotion) => number): number =>
    (value(after) - value(before)) / (2 * STEP);
  return [
    [slope(({ pose }) => pose.x), now.velocity[0]],
    [slope(({ pose }) => pose.y), now.velocity[1]],
    [slope(({ pose }) => pose.heading), now.omega],
    [slope(({ velocity }) => velocity[0]), now.acceleration[0]],
    [slope(({ velocity }) => velocity[1]), now.acceleration[1]],
    [slope(({ omega }) => omega), now.alpha],
  ];
}

function expectSame(pairs: readonly (readonly [number, number])[], tolerance: number): void {
  for (const [found, stated] of pairs) {
    expect(Math.abs(found - stated)).toBeLessThan(tolerance * (1 + Math.abs(stated)));
  }
}

describe('the truth of the demo scenes', () => {
  const unit = jackKnifeMotion();
  it('of the spin: velocities are the rates of the poses, accelerations those of the velocities', () => {
    const motion = spinMotion();
    for (const time of [0.1, 0.45, 0.9, 1.35, 1.8, 2.3, 2.8]) {
      expectSame(differences(motion.at, time), 2e-5);
    }
  });

  it('of the spin: the energy lost is the work of friction at the wheels', () => {
    const motion = spinMotion();
    const energy = ({ velocity, omega }: BodyMotion): number =>
      0.5 * CAR.mass * Math.hypot(...velocity) ** 2 + 0.5 * CAR.inertia * omega ** 2;
    let work = 0;
    const dt = 0.0005;
    for (let time = dt / 2; time < 2.5; time += dt) {
      const body = motion.at(time);
      for (const wheel of WHEELS) {
        const speed = Math.hypot(...velocityAt(body, CAR.wheels[wheel]));
        work += CAR.dragFactor * motion.loads[wheel] * speed * dt;
      }
    }
    const lost = energy(motion.at(0)) - energy(motion.at(2.5));
    expect(Math.abs(lost - work) / work).toBeLessThan(1e-4);
  });

  it('of the spin: the car turns about two hundred degrees within the friction that it has', () => {
    const motion = spinMotion();
    const turned = motion.at(motion.restTime).pose.heading - motion.at(0).pose.heading;
    expect((turned * 180) / Math.PI).toBeGreaterThan(190);
    expect((turned * 180) / Math.PI).toBeLessThan(215);
    for (let time = 0; time < motion.restTime; time += 0.1) {
      const demand = Math.hypot(...motion.at(time).acceleration);
      expect(demand).toBeLessThanOrEqual(CAR.dragFactor * GRAVITY);
    }
  });

  it('of the jack-knife: both bodies are consistent in time, before and after the trailer locks', () => {
    for (const time of [0.3, 0.75, 1.2, 1.6, 2.1, 2.6]) {
      expectSame(
        differences((t) => unit.at(t).tractor, time),
        2e-4,
      );
      expectSame(
        differences((t) => unit.at(t).trailer, time),
        2e-4,
      );
    }
  });

  it('of the jack-knife: the kingpin holds, and the axle has no side-slip while it rolls', () => {
    const slipAt = (time: number): number => {
      const { trailer } = unit.at(time);
      return turn(velocityAt(trailer, UNIT.points.trailer.axle), -trailer.pose.heading)[1];
    };
    for (const time of [0, 0.5, 1, 1.5, 2, 2.5, 3]) {
      const { tractor, trailer } = unit.at(time);
      const [ax, ay] = place(tractor.pose, UNIT.points.tractor.K);
      const [bx, by] = place(trailer.pose, UNIT.points.trailer.K);
      expect(Math.hypot(ax - bx, ay - by)).toBeLessThan(1e-9);
    }
    for (const time of [0, 0.5, 1, 1.5]) expect(Math.abs(slipAt(time))).toBeLessThan(1e-9);
    expect(Math.abs(slipAt(2.5))).toBeGreaterThan(0.1);
  });

  it('of the press: crank, rod and ram are consistent in time', () => {
    const at = (time: number) =>
      pressMotion(
        CONTACT.angle + CONTACT.rate * time + 0.5 * CONTACT.rateChange * time ** 2,
        CONTACT.rate + CONTACT.rateChange * time,
        CONTACT.rateChange,
      );
    expectSame(
      differences((t) => at(t).crank, 0),
      1e-4,
    );
    expectSame(
      differences((t) => at(t).rod, 0),
      1e-4,
    );
    expectSame(
      differences((t) => at(t).ram, 0),
      1e-4,
    );
  });
});

describe('the data of the demo scenes', () => {
  const drafts = [spinDraft(), jackKnifeDraft(), pressDraft()];

  it('is the same every time', () => {
    for (const make of [spinDraft, pressDraft]) {
      const [first, second] = [make(), make()];
      expect(second.texts).toEqual(first.texts);
      expect(JSON.stringify(second.documents)).toBe(JSON.stringify(first.documents));
      expect(JSON.stringify(second.scene)).toBe(JSON.stringify(first.scene));
    }
  });

  it('names only survey points, bodies and body points that exist', () => {
    for (const { scene, texts } of drafts) {
      const rows = texts[scene.survey.file].trim().split('\r\n').slice(1);
      const ids = rows.map((row) => row.split(',')[0]);
      expect(new Set(ids).size).toBe(ids.length);
      const known = new Set(ids);
      const { bodies, stations, traces, joints } = scene.reconstruction;
      const points = new Set(
        bodies.flatMap((body) => Object.keys(body.points).map((point) => `${body.id}.${point}`)),
      );
      const marks = stations.flatMap((station) => station.marks);
      const used = [
        ...marks.map((mark) => mark.survey),
        ...traces.flatMap((trace) => trace.points),
      ];
      expect(used.filter((id) => !known.has(id))).toEqual([]);
      const ends = [...marks, ...traces, ...joints.map((joint) => joint.a)];
      expect(ends.filter(({ body, point }) => !points.has(`${body}.${point}`))).toEqual([]);
    }
  });

  it('has exhibits whose files are made, and no attorney among the people of the case', () => {
    for (const draft of drafts) {
      const photographs = draft.shots.map((shot) => `photographs/photograph-0${shot.number}.jpg`);
      const made = new Set([
        ...Object.keys(draft.texts),
        ...Object.keys(draft.documents),
        draft.sketchFile,
        ...photographs,
      ]);
      const named = draft.exhibits.flatMap((exhibit) => exhibit.files.map(([path]) => path));
      expect(named.filter((path) => !made.has(path))).toEqual([]);
      expect(named).not.toContain('truth.json');
      const attorneys = draft.scene.parties.map((party) => party.attorney);
      expect(draft.scene.people.filter((person) => attorneys.includes(person.name))).toEqual([]);
    }
  });
});

describe('the photographs of the demo scenes', () => {
  it('carry time, offset, lens and position that a reader gets back', async () => {
    const camera = lookFrom({ eye: [0, -8, 1.7], target: [6, -2, 0], focalLength: 28 });
    const exif = exifOf(camera, {
      ...cameraTime('2026-10-17T15:04:37-08:00'),
      latitude: -47.5201,
      longitude: -120.2096,
      altitude: 31.4,
      seed: 1,
    });
    const blank = { width: 8, height: 8, channels: 3 as const, background: '#888888' };
    const picture = await sharp({ create: blank }).withExif(exif).jpeg().toBuffer();
    const read: unknown = await exifr.parse(picture, {
      reviveValues: false,
      translateValues: false,
      gps: true,
    });
    expect(read).toMatchObject({
      Make: 'Quellmere Optics',
      DateTimeOriginal: '2026:10:17 15:04:37',
      OffsetTimeOriginal: '-08:00',
      FocalLength: 28,
      Orientation: 1,
      GPSDateStamp: '2026:10:17',
      GPSTimeStamp: [23, 4, 37],
    });
    const position = await exifr.gps(picture);
    expect(position.latitude).toBeCloseTo(-47.5201, 5);
    expect(position.longitude).toBeCloseTo(-120.2096, 5);
  });

  it('show a point where the collinearity equations put it', () => {
    // Camera at 2 m height looking along +x, level: u = c + f·(-y/x), v = c + f·(h/x).
    const camera = lookFrom({ eye: [0, 0, 2], target: [10, 0, 2], focalLength: 36 });
    const pixel = project(camera, [10, 1, 0]);
    expect(pixel?.[0]).toBeCloseTo(720 - 1440 * 0.1, 9);
    expect(pixel?.[1]).toBeCloseTo(540 + 1440 * 0.2, 9);
    expect(project(camera, [-5, 0, 0])).toBeNull();
  });
});
