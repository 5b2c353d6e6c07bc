import type { BodyMotion, Pose, Vec2 } from './plane-motion';

/**
 * The truth of "Press 4, Fennel Works": an in-line slider-crank in elevation (x right, y up). The crank
 * turns about O on the frame, the ram slides in vertical guides below it. Positions, velocities and
 * accelerations in closed form from the crank's angle, rate and rate change.
 */
export const PRESS = {
  crank: 0.08,
  rod: 0.36,
  /** Centre of the crank shaft in the scene frame. */
  shaft: [0, 0],
  points: {
    crank: { O: [0, 0], A: [0.08, 0], P1: [0.118, 0.052], P2: [-0.096, -0.071] },
    rod: { A: [0, 0], B: [0.36, 0], Q1: [0.205, 0.031] },
    ram: { B: [0, 0], H: [0, 0.14], CL: [-0.165, -0.09], CR: [0.165, -0.09] },
  },
} as const satisfies {
  points: Record<string, Record<string, Vec2>>;
} & Record<string, unknown>;

const DEGREE = Math.PI / 180;

/** Crank angle from +x; bottom dead centre is at -90 degrees. */
export const CONTACT = { angle: (-90 - 60.6) * DEGREE, rate: 5.86, rateChange: -0.42 } as const;

/** Where the press stood when it was found and locked out: this far before bottom dead centre. */
export const FOUND_ANGLE = (-90 - 21.4) * DEGREE;

export interface PressMotion {
  crank: BodyMotion;
  rod: BodyMotion;
  ram: BodyMotion;
}

export function pressMotion(angle: number, rate: number, rateChange: number): PressMotion {
  const { crank: r, rod: length } = PRESS;
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  const pin: Vec2 = [r * cos, r * sin];
  const pinVelocity: Vec2 = [-rate * pin[1], rate * pin[0]];
  const pinAcceleration: Vec2 = [
    -rateChange * pin[1] - rate * rate * pin[0],
    rateChange * pin[0] - rate * rate * pin[1],
  ];
  // The rod's foot stays on x = 0, so its own x component undoes the pin's.
  const across = -pin[0] / length;
  const down = -Math.sqrt(1 - across * across);
  const rodHeading = Math.atan2(down, across);
  const rodRate = -pinVelocity[0] / (-length * down);
  const rodRateChange = (-pinAcceleration[0] + rodRate ** 2 * length * across) / (-length * down);
  const foot = pin[1] + length * down;
  const footVelocity = pinVelocity[1] + rodRate * length * across;
  const footAcceleration =
    pinAcceleration[1] + rodRateChange * length * across - rodRate ** 2 * length * down;
  const body = (
    pose: Pose,
    velocity: Vec2,
    omega: number,
    acceleration: Vec2,
    alpha: number,
  ): BodyMotion => ({ pose, velocity, omega, acceleration, alpha });
  return {
    crank: body({ x: 0, y: 0, heading: angle }, [0, 0], rate, [0, 0], rateChange),
    rod: body(
      { x: pin[0], y: pin[1], heading: rodHeading },
      pinVelocity,
      rodRate,
      pinAcceleration,
      rodRateChange,
    ),
    ram: body({ x: 0, y: foot, heading: 0 }, [0, footVelocity], 0, [0, footAcceleration], 0),
  };
}

export const atContact = (): PressMotion =>
  pressMotion(CONTACT.angle, CONTACT.rate, CONTACT.rateChange);
export const asFound = (): PressMotion => pressMotion(FOUND_ANGLE, 0, 0);
