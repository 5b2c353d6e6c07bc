import { type BodyMotion, type Vec2, accelerationAt, place, velocityAt } from './plane-motion';
import { CONTACT, FOUND_ANGLE, PRESS, type PressMotion, asFound, atContact } from './press-motion';
import { PRESS_SIGMA } from './press-survey';
import { rounded } from './folder';
import { NOTICE } from './scene';

function station(motion: PressMotion): Record<string, unknown> {
  const part = (name: keyof PressMotion): Record<string, unknown> => {
    const body: BodyMotion = motion[name];
    const points = Object.entries<Vec2>(PRESS.points[name]).map(([point, at]) => [
      point,
      {
        place: place(body.pose, at),
        velocity: velocityAt(body, at),
        acceleration: accelerationAt(body, at),
      },
    ]);
    return { ...body, points: Object.fromEntries(points) };
  };
  return { crank: part('crank'), rod: part('rod'), ram: part('ram') };
}

export function pressTruth(): Record<string, unknown> {
  return rounded(
    {
      format: 'centrode.demo-truth/1',
      notice: NOTICE,
      units: 'm, s, rad; scene frame x right, y up; angles counter-clockwise from +x',
      model: 'In-line slider-crank, closed form; crank slowing a little at contact.',
      noise: {
        datumSigma: PRESS_SIGMA.datum,
        edgeSigma: PRESS_SIGMA.edge,
        witnessSigma: PRESS_SIGMA.witness,
        plateSpeed: (960 * 2 * Math.PI) / 60 / 17,
        plateTolerance: 0.03,
      },
      machine: { crank: PRESS.crank, rod: PRESS.rod, points: PRESS.points },
      beforeBottomDeadCentre: {
        contact: -Math.PI / 2 - CONTACT.angle,
        found: -Math.PI / 2 - FOUND_ANGLE,
      },
      stations: [
        { id: 'S1', time: 0, ...station(atContact()) },
        { id: 'S2', time: null, ...station(asFound()) },
      ],
    },
    6,
  );
}
