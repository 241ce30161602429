/** One crankpin (throw), counted from the end that is numbered 1. */
export interface Throw {
  /** Where the pin stands on its circle, in whole degrees, seen from the numbered end; 0 is up. */
  readonly angle: number;
  /** Which rods run on it, by cylinder number. */
  readonly rods: readonly number[];
}

/** How an engine is made: what part maps, features and positions are drawn from. */
export interface Made {
  readonly layout: 'single' | 'inline' | 'vee' | 'flat';
  /** Angle between banks in whole degrees; 0 for single and inline, 180 for flat. */
  readonly bankAngle: number;
  /** The end that is numbered 1. */
  readonly numberedFrom: 'front' | 'flywheel';
  readonly cylinders: number;
  /** Cylinder numbers bank by bank, each from the numbered end. */
  readonly banks: readonly (readonly number[])[];
  readonly mains: number;
  readonly throws: readonly Throw[];
}
