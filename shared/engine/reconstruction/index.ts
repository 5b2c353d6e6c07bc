export { markDirections } from './mark-directions';
export { motionOfStation, type StationMotion } from './motion-of-station';
export { poseOfStation, poseProblemOf, type StationPose } from './pose-of-station';
export { answerStation, solveStation } from './solve-station';
export { speedsOf } from './speeds';
export { stationProblemOf } from './station-problem';
export { stationUncertainty } from './station-uncertainty';
