export { rankAssignments, type RankedAssignment } from './assignments';
export { fitPoses } from './fit-poses';
export { pointEllipse, type PointEllipse } from './point-ellipse';
export { rigidFit, similarityPose, type RigidFit } from './rigid-fit';
