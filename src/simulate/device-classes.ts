export const CLASS_NAMES = ['ideal', 'good', 'typical', 'poor'] as const;
export type ClassName = (typeof CLASS_NAMES)[number];

/** Errors of one sensor in its unit u; see the plan's schema for each. */
export interface SensorErrors {
  noise_density: number;
  bias_sd: number;
  turn_on_sd: number;
  bias_instability: number;
  random_walk: number;
  scale_sd: number;
  misalignment_sd_rad: number;
  per_degC_sd: number;
  range: number;
  step: number;
}

export interface DeviceErrors {
  accel: SensorErrors;
  gyro: SensorErrors;
  mag: SensorErrors;
  baro: SensorErrors;
  clock_ppm: number;
  jitter_s: number;
  stamp_error_s: number;
  loss_per_min: number;
  loss_s: number;
  duplicates: number;
  disorder: number;
  warming_degC: number;
  warming_s: number;
}

const NONE: SensorErrors = {
  noise_density: 0,
  bias_sd: 0,
  turn_on_sd: 0,
  bias_instability: 0,
  random_walk: 0,
  scale_sd: 0,
  misalignment_sd_rad: 0,
  per_degC_sd: 0,
  range: Number.POSITIVE_INFINITY,
  step: 0,
};

const STEADY = {
  clock_ppm: 0,
  jitter_s: 0,
  stamp_error_s: 0,
  loss_per_min: 0,
  loss_s: 0.3,
  duplicates: 0,
  disorder: 0,
  warming_degC: 0,
  warming_s: 600,
};

const DEG = Math.PI / 180;
/** One milli-g, m/s². */
const MG = 9.80665e-3;

/**
 * Classes of phones, in m/s², rad/s, uT and hPa.
 *
 * Noise densities after the data sheets of consumer parts (secondary copies): gyroscopes 3.8 to 7
 * mdps/sqrt(Hz), accelerometers 70 to 180 ug/sqrt(Hz); gyroscope bias instability 5 to 20 degrees an
 * hour as found in phones. Biases are what is left after the phone's own correction; these, scale,
 * misalignment, iron and timing are common practice, no source.
 */
export const DEVICE_CLASSES: Readonly<Record<ClassName, DeviceErrors>> = {
  ideal: { ...STEADY, accel: NONE, gyro: NONE, mag: NONE, baro: NONE },
  good: {
    ...STEADY,
    clock_ppm: 2,
    accel: {
      noise_density: 0.1 * MG,
      bias_sd: 3 * MG,
      turn_on_sd: 1 * MG,
      bias_instability: 0.03 * MG,
      random_walk: 1e-5,
      scale_sd: 0.002,
      misalignment_sd_rad: 0.002,
      per_degC_sd: 0.1 * MG,
      range: 8000 * MG,
      step: 8000 * MG * 2 ** -15,
    },
    gyro: {
      noise_density: 0.004 * DEG,
      bias_sd: 0.05 * DEG,
      turn_on_sd: 0.02 * DEG,
      bias_instability: (5 / 3600) * DEG,
      random_walk: 2e-6,
      scale_sd: 0.003,
      misalignment_sd_rad: 0.002,
      per_degC_sd: 0.005 * DEG,
      range: 2000 * DEG,
      step: 2000 * DEG * 2 ** -17,
    },
    mag: {
      ...NONE,
      noise_density: 0.03,
      bias_sd: 0.3,
      bias_instability: 0.02,
      scale_sd: 0.005,
      misalignment_sd_rad: 0.003,
      range: 4900,
      step: 0.06,
    },
    baro: {
      ...NONE,
      noise_density: 0.004,
      bias_sd: 0.5,
      bias_instability: 0.002,
      random_walk: 1e-4,
      step: 0.001,
    },
  },
  typical: {
    ...STEADY,
    clock_ppm: 8,
    jitter_s: 2e-4,
    warming_degC: 4,
    accel: {
      noise_density: 0.18 * MG,
      bias_sd: 8 * MG,
      turn_on_sd: 2 * MG,
      bias_instability: 0.06 * MG,
      random_walk: 3e-5,
      scale_sd: 0.005,
      misalignment_sd_rad: 0.005,
      per_degC_sd: 0.3 * MG,
      range: 8000 * MG,
      step: 8000 * MG * 2 ** -15,
    },
    gyro: {
      noise_density: 0.007 * DEG,
      bias_sd: 0.2 * DEG,
      turn_on_sd: 0.05 * DEG,
      bias_instability: (10 / 3600) * DEG,
      random_walk: 5e-6,
      scale_sd: 0.008,
      misalignment_sd_rad: 0.005,
      per_degC_sd: 0.01 * DEG,
      range: 2000 * DEG,
      step: 2000 * DEG * 2 ** -15,
    },
    mag: {
      ...NONE,
      noise_density: 0.06,
      bias_sd: 1.2,
      bias_instability: 0.05,
      scale_sd: 0.015,
      misalignment_sd_rad: 0.008,
      range: 4900,
      step: 0.15,
    },
    baro: {
      ...NONE,
      noise_density: 0.008,
      bias_sd: 1,
      bias_instability: 0.004,
      random_walk: 2e-4,
      step: 0.001,
    },
  },
  poor: {
    ...STEADY,
    clock_ppm: 40,
    jitter_s: 1.5e-3,
    loss_per_min: 0.5,
    duplicates: 5e-4,
    disorder: 5e-4,
    warming_degC: 8,
    accel: {
      noise_density: 0.4 * MG,
      bias_sd: 25 * MG,
      turn_on_sd: 5 * MG,
      bias_instability: 0.15 * MG,
      random_walk: 1e-4,
      scale_sd: 0.015,
      misalignment_sd_rad: 0.015,
      per_degC_sd: 1 * MG,
      range: 2000 * MG,
      step: 2000 * MG * 2 ** -11,
    },
    gyro: {
      noise_density: 0.02 * DEG,
      bias_sd: 1 * DEG,
      turn_on_sd: 0.2 * DEG,
      bias_instability: (20 / 3600) * DEG,
      random_walk: 2e-5,
      scale_sd: 0.02,
      misalignment_sd_rad: 0.015,
      per_degC_sd: 0.03 * DEG,
      range: 500 * DEG,
      step: 500 * DEG * 2 ** -15,
    },
    mag: {
      ...NONE,
      noise_density: 0.2,
      bias_sd: 5,
      bias_instability: 0.2,
      scale_sd: 0.05,
      misalignment_sd_rad: 0.02,
      range: 1200,
      step: 0.3,
    },
    baro: { ...NONE, noise_density: 0.03, bias_sd: 3, bias_instability: 0.01, random_walk: 1e-3, step: 0.01 },
  },
};
