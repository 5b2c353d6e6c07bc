export interface WorkingStep {
  readonly kind: string;
}
export interface Working {
  readonly steps: readonly WorkingStep[];
}
