/**
 * All that a stage may know of a walk besides its tables: plain data, the same as JSON, so that it can
 * be hashed for provenance and sent to a worker thread.
 */
export interface WalkContext {
  /** How the phone was carried; null where the campaign does not say. */
  carry: string | null;
  walker: WalkerContext;
  place: PlaceContext;
  /** Null where the walk names no start checkpoint: the path then starts at the origin, unscored. */
  start: StartContext | null;
  /** Passes of surveyed checkpoints in time order, times since the walk's first reading. */
  passes: readonly PassContext[];
  /** Passes more than a second outside the log: reported, never scored. Absent where there are none. */
  passes_outside?: readonly PassContext[];
  /** The floor that is walked on, from the floor plan; absent where there is none. */
  floor?: FloorContext;
  /** Calibration of the walk's device; null where there is none. */
  device: DeviceCalibration | null;
}

export interface WalkerContext {
  walker: string;
  group: string;
  height_m: number | null;
  leg_m: number | null;
  mass_kg: number | null;
  /** Step-length constants by model name, from calibration; empty where the walker is not calibrated. */
  step_constants: Readonly<Record<string, StepConstant>>;
}

/** A calibrated constant of a step-length model, in the model's own unit. */
export interface StepConstant {
  value: number;
  sd: number;
  /** Whose walks it was fitted on: `walker` or `group`. */
  from: string;
}

export interface PlaceContext {
  /** Direction of magnetic north against grid north, clockwise positive. */
  declination_rad: number;
  /** `model`, `given`, or `assumed` (grid north is taken to be magnetic north). */
  declination_source: string;
  /** Field expected at the place; null where the campaign does not say where it is. */
  field_uT: number | null;
  /** Inclination of the field, down positive; null as above. */
  dip_rad: number | null;
  /** Magnitude of gravity at the place (normal gravity), or the standard value. */
  gravity_mps2: number;
}

export interface StartContext {
  checkpoint: string;
  east_m: number;
  north_m: number;
  /** Standard uncertainty of each coordinate. */
  sigma_m: number;
  /** When the walker stood there (since the first reading), from the pass; null: at the first reading. */
  t_s: number | null;
  sigma_s: number;
  /** Walking direction at the start, clockwise from grid north; null where unknown. */
  heading_rad: number | null;
}

export interface FloorContext {
  /**
   * Which way walls and corridors run: 90 shares of their length, sum 1, share i from i to i + 1 degrees clockwise from
   * grid north, modulo 90.
   */
  wall_share: readonly number[];
}

export interface PassContext {
  checkpoint: string;
  t_s: number;
  sigma_s: number;
  role: 'anchor' | 'scored';
  east_m: number;
  north_m: number;
  sigma_m: number;
}

/** Calibrated reading = matrix (3 x 3, row-major, device frame) times (raw minus bias). */
export interface AxisCalibration {
  bias: readonly [number, number, number];
  matrix: readonly [number, number, number, number, number, number, number, number, number];
}

export interface DeviceCalibration {
  accel: AxisCalibration | null;
  gyro: AxisCalibration | null;
  mag: AxisCalibration | null;
  /** Seconds to add to a sensor's times, by sensor. */
  delay_s: Readonly<Record<string, number>>;
}
