import { add, rotate, scale, type Pose, type Vector } from '../geometry/vector';

export interface RigidFit extends Pose {
  /** Scale of the marks against the body that would fit best; 1 when both are right. */
  readonly scale: number;
  /** Weighted centroid of the body points, body frame. */
  readonly centroid: Vector;
}

/**
 * The pose that brings body points closest to marks: min Σ wᵢ |qᵢ − (R(ψ)·bᵢ + t)|², in closed
 * form and in one pass.
 *
 * `body` and `marks` hold x and y in turn, m; `weights` 1/σ² or null for equal ones. Sums are taken
 * about the first pair, so that large map coordinates keep their digits. Points that all coincide
 * give heading 0; the caller knows.
 * Source: the plane case of W. Kabsch, Acta Cryst. A32 (1976) 922, and S. Umeyama, IEEE Trans.
 * Pattern Anal. Mach. Intell. 13 (1991) 376, both from memory.
 */
export function rigidFit(
  body: Float64Array,
  marks: Float64Array,
  weights: Float64Array | null = null,
): RigidFit {
  const n = body.length >> 1;
  const bx0 = body[0];
  const by0 = body[1];
  const qx0 = marks[0];
  const qy0 = marks[1];
  let total = 0;
  let bx = 0;
  let by = 0;
  let qx = 0;
  let qy = 0;
  let along = 0;
  let across = 0;
  let square = 0;
  for (let i = 0; i < n; i++) {
    const w = weights === null ? 1 : weights[i];
    const px = body[2 * i] - bx0;
    const py = body[2 * i + 1] - by0;
    const mx = marks[2 * i] - qx0;
    const my = marks[2 * i + 1] - qy0;
    total += w;
    bx += w * px;
    by += w * py;
    qx += w * mx;
    qy += w * my;
    along += w * (px * mx + py * my);
    across += w * (px * my - py * mx);
    square += w * (px * px + py * py);
  }
  bx /= total;
  by /= total;
  qx /= total;
  qy /= total;
  along -= total * (bx * qx + by * qy);
  across -= total * (bx * qy - by * qx);
  square -= total * (bx * bx + by * by);
  const heading = Math.atan2(across, along);
  const c = Math.cos(heading);
  const s = Math.sin(heading);
  const centreX = bx + bx0;
  const centreY = by + by0;
  return {
    x: qx + qx0 - (c * centreX - s * centreY),
    y: qy + qy0 - (s * centreX + c * centreY),
    heading,
    scale: Math.hypot(along, across) / square,
    centroid: [centreX, centreY],
  };
}

/** The pose when the scale is fitted too: a test of the body's dimensions and of the map's scale. */
export function similarityPose(fit: RigidFit): Pose {
  const [x, y] = add([fit.x, fit.y], scale(1 - fit.scale, rotate(fit.heading, fit.centroid)));
  return { x, y, heading: fit.heading };
}
