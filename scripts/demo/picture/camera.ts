/** Pin-hole camera over the scene: z up, metres; pixels from the top left corner. */
export type Vec3 = readonly [number, number, number];

export interface CameraPose {
  eye: Vec3;
  target: Vec3;
  /** Focal length, mm, on a 36 mm wide image. */
  focalLength: number;
}

export const IMAGE = { width: 1440, height: 1080 } as const;

export interface Camera {
  pose: CameraPose;
  /** Unit axes of the image: to the right, downwards, and along the view. */
  right: Vec3;
  down: Vec3;
  forward: Vec3;
  /** Focal length in pixels of the finished image. */
  pixels: number;
}

export const subtract = (a: Vec3, b: Vec3): Vec3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
export const dot = (a: Vec3, b: Vec3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
export const unit = (a: Vec3): Vec3 => {
  const size = Math.sqrt(dot(a, a));
  return [a[0] / size, a[1] / size, a[2] / size];
};
const cross = (a: Vec3, b: Vec3): Vec3 => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];

export function lookFrom(pose: CameraPose): Camera {
  const forward = unit(subtract(pose.target, pose.eye));
  const right = unit(cross(forward, [0, 0, 1]));
  const down = cross(forward, right);
  return { pose, right, down, forward, pixels: (pose.focalLength / 36) * IMAGE.width };
}

/** Pixel of a scene point, or null when it lies behind the camera or outside the picture. */
export function project(camera: Camera, point: Vec3): readonly [number, number] | null {
  const offset = subtract(point, camera.pose.eye);
  const depth = dot(offset, camera.forward);
  if (depth < 0.05) return null;
  const u = IMAGE.width / 2 + (camera.pixels * dot(offset, camera.right)) / depth;
  const v = IMAGE.height / 2 + (camera.pixels * dot(offset, camera.down)) / depth;
  const inside = u >= 0 && v >= 0 && u < IMAGE.width && v < IMAGE.height;
  return inside ? [u, v] : null;
}
