export { addressOf, canonicalText, sha256Hex } from '../documents/canonical';
export { compute, engineVersion, solveDocument, type Computed } from './compute';
export { recompute, type Difference, type Recomputed } from './recompute';
export { recomputeReport, type RecomputeReport } from './report';
export { documentSchemas } from './schemas';
export { solvers, type Solver } from './solvers';
