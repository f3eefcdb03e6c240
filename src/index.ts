/**
 * The public API: everything the command line does, and each reader, stage, method and score by itself.
 *
 * Angles are radians, lengths metres, times seconds; columns carry their unit in their name. A path from
 * phone sensors can be far off: do not use it where a wrong position could hurt someone.
 *
 * @packageDocumentation
 */

// Calibration
export { fitNorm, type NormFit, type NormShape } from './calibration/fit-norm.js';
export { fitGyroScale, type GyroScaleFit, type PoseChange } from './calibration/gyro-scale.js';
export {
  type FittedConstant,
  fitStepConstants,
  type MeasuredWalk,
  type StepConstants,
} from './calibration/step-constants.js';
export { type StillPose, stillPoses } from './calibration/still-poses.js';
export { type AttitudeTruth, readAttitudeTruth } from './campaign/attitude-truth.js';
export type {
  AxisCalibration,
  DeviceCalibration,
  FloorContext,
  PassContext,
  PlaceContext,
  StartContext,
  StepConstant,
  WalkContext,
  WalkerContext,
} from './campaign/context.js';
export { findRecipe } from './campaign/find-recipe.js';
export { type PathTruth, readPathTruth } from './campaign/path-truth.js';
export { readDeviceCalibration, readStepConstants } from './campaign/read-calibration.js';
export { readCampaign } from './campaign/read-campaign.js';
export { hashLog, readLog } from './campaign/read-log.js';
export type { ImportCounts, LogReadings } from './campaign/readings.js';
export {
  defaultRecipe,
  parseRecipe,
  type Recipe,
  readRecipe,
  renderRecipe,
  type StageChoice,
} from './campaign/recipe.js';
export { type RunRecord, readRunRecord, type WalkRecord, writeRunRecord } from './campaign/run-record.js';
export { secondsSinceStart } from './campaign/seconds-since-start.js';
export {
  type Campaign,
  type ColumnRef,
  type Grid,
  type LogLayout,
  type Pass,
  SENSOR_NAMES,
  type SensorLayout,
  type SensorName,
  type StepInstant,
  type SurveyedPoint,
  type TimeUnit,
  type Walk,
  type Walker,
} from './campaign/types.js';
export { type LogSpan, walkContext } from './campaign/walk-context.js';
export { writeCalibrationPart } from './campaign/write-calibration.js';
export {
  type WrittenColumn,
  writeCampaignYaml,
  writeCsv,
  writeNumberCsv,
} from './campaign/write-campaign.js';
export { DEMO_PLAN, makeDemo } from './demo.js';
// The campaign folder
export { InputError, InputErrors, messageOf } from './errors.js';
// Geometry, geodesy, the geomagnetic field
export { alignPlanar, type PlanarAlignment } from './geometry/alignment-2d.js';
export { edgeDirections } from './geometry/edge-directions.js';
export {
  ecefFromGeodetic,
  type GeodeticGrid,
  type GeodeticPoint,
  type GridPoint,
  geodeticFromEcef,
  geodeticFromGrid,
  gridFromGeodetic,
} from './geometry/enu.js';
export { decimalYear, type GeomagneticField, geomagneticField } from './geometry/geomagnetic-field.js';
export { normalGravity } from './geometry/normal-gravity.js';
export {
  conjugate,
  fromMatrix,
  fromRotationVector,
  multiply,
  normalized,
  type Quaternion,
  rotate,
  type Vector3,
} from './geometry/quaternion.js';
export { type Alignment, type AlignmentKind, alignPoints } from './geometry/umeyama.js';
export { WGS84_A_M, WGS84_E2, WGS84_FLATTENING } from './geometry/wgs84.js';
export { GEOMAGNETIC_MODELS, type GeomagneticModel } from './geometry/wmm-coefficients.js';
export {
  type CalibratedSensor,
  type CalibrateOptions,
  calibrateDelay,
  calibrateDevice,
  type DelayFit,
  type DeviceFit,
} from './pipeline/calibrate-device.js';
export { calibrateWalkers, type WalkersFit } from './pipeline/calibrate-walkers.js';
export {
  type CheckedCampaign,
  type CheckedWalk,
  type CheckOptions,
  checkCampaign,
} from './pipeline/check-campaign.js';
export { compareResults, type ResultsComparison } from './pipeline/compare-results.js';
export { type AxisNoise, noiseOfLog } from './pipeline/noise-of-log.js';
export { problemOf, type WalkJob, type WalkOutcome, type WalkProblem, walkJob } from './pipeline/outcome.js';
export { type Results, readResults } from './pipeline/read-results.js';
export { STAGE_NAMES, STAGES } from './pipeline/stages.js';
// Running, checking, scoring, comparing
export {
  chosenWalks,
  faultFile,
  type RunOptions,
  type RunResult,
  recipeOf,
  runCampaign,
} from './pipeline.js';
// Plots
export { type NoiseCurve, noisePlot } from './report/noise-plot.js';
export { svgPlot } from './report/svg-plot.js';
// Scores
export { type ErrorStatistics, errorStatistics } from './scores/error-statistics.js';
export { type Gate, gateHolds, parseGate } from './scores/gate.js';
export { groupScores } from './scores/group-scores.js';
export { type ComparedGroup, compareWalks, type PairedWalk } from './scores/paired-comparison.js';
export { STEP_TOLERANCE_S, type StepAgreement, stepAgreement } from './scores/step-agreement.js';
export { type ScoredWalk, walkScores } from './scores/walk-scores.js';
// Signal kernels
export { butterworthHighPass, butterworthLowPass, type Sections } from './signal/butterworth.js';
export { fillGaps } from './signal/fill-gaps.js';
export { interpolateLinear } from './signal/interpolate.js';
export { interpolateCubic } from './signal/interpolate-cubic.js';
export { localMaxima, parabolicTop, peakProminences } from './signal/local-maxima.js';
export { decimate, lowPassTaps } from './signal/low-pass-fir.js';
export { medianRateHz } from './signal/sampling-rate.js';
export { type StillWindow, stillWindows } from './signal/still-windows.js';
export { type VectorDelay, vectorDelay } from './signal/vector-delay.js';
export { zeroPhase } from './signal/zero-phase.js';
export { type Cast, castOf, routeKey, simulateWalks } from './simulate/cast.js';
// Simulation
export {
  type DisturbancePlan,
  type GroupPlan,
  type PlanYaml,
  planSchema,
  type RoutePlan,
  type WalkerPlan,
  type WalksPlan,
} from './simulate/plan-schema.js';
export { readPlan, type SimulationPlan } from './simulate/read-plan.js';
export { type SimulationSummary, simulateCampaign } from './simulate/simulate-campaign.js';
export {
  type SensorStream,
  type SimulatedWalk,
  simulateWalk,
  type WalkSetting,
} from './simulate/simulate-walk.js';
export { type AttitudeInputs, attitudeStage } from './stages/attitude/index.js';
export {
  fixedIntervalSmoother,
  type SmootherSettings,
  smootherSettings,
} from './stages/attitude/methods/fixed-interval-smoother.js';
export { type CheckpointsInputs, checkpointsStage } from './stages/checkpoints/index.js';
export { atPassTimes } from './stages/checkpoints/methods/at-pass-times.js';
export { type FindingsInputs, findingsStage } from './stages/findings/index.js';
export { logCheck } from './stages/findings/methods/log-check.js';
export { type HeadingsInputs, headingsStage } from './stages/headings/index.js';
export { deviceAxis } from './stages/headings/methods/device-axis.js';
export { trackedOffset } from './stages/headings/methods/tracked-offset.js';
export { LeftOut } from './stages/left-out.js';
export { type MotionInputs, motionStage } from './stages/motion/index.js';
export { uniformGrid } from './stages/motion/methods/uniform-grid.js';
export { type PathInputs, pathStage } from './stages/path/index.js';
export { deadReckoning } from './stages/path/methods/dead-reckoning.js';
// Stages and their methods
export {
  type AnyStage,
  type ContextParts,
  defineMethod,
  defineStage,
  type Method,
  partsUsed,
  type Stage,
} from './stages/stage.js';
export { type StepsInputs, stepsStage } from './stages/steps/index.js';
export { adaptivePeakValley } from './stages/steps/methods/adaptive-peak-valley.js';
export { peakChain } from './stages/steps/methods/peak-chain.js';
export { type StridesInputs, stridesStage } from './stages/strides/index.js';
export { weinberg } from './stages/strides/methods/weinberg.js';
export { type AllanDeviation, type AllanKind, allanDeviation } from './stats/allan.js';
// Statistics
export { equivalentDegreesOfFreedom } from './stats/allan-degrees.js';
export {
  type BootstrapInterval,
  type BootstrapOptions,
  clusterBootstrap,
  type IndexStatistics,
} from './stats/bootstrap.js';
export { chiSquareCdf, chiSquareQuantile } from './stats/chi-square.js';
export {
  type CircleChain,
  type CircleMove,
  type SmoothedCircle,
  smoothOnCircle,
} from './stats/circle-smoother.js';
export { type CircularMean, circularMean, wrapToPi, wrapToTurn } from './stats/circular.js';
export { type Clusters, drawClusters, groupByCluster, largestCluster } from './stats/cluster-resampling.js';
export {
  type Consistency,
  consistency,
  type ErrorEllipse,
  errorEllipse,
  normalizedErrorSquared,
  type PlanarCovariance,
} from './stats/ellipse.js';
export {
  type Chain,
  Measurements,
  type SmoothedChain,
  smoothChain,
} from './stats/fixed-interval-smoother.js';
export { holmAdjusted } from './stats/holm.js';
export { incompleteBeta, incompleteGamma, logGamma } from './stats/incomplete-functions.js';
export { type Matching, matchInstants } from './stats/match-instants.js';
export { noiseExponent } from './stats/noise-exponent.js';
export { fitNoise, fittedAllanDeviation, type NoiseFit, type NoiseParameter } from './stats/noise-fit.js';
export { type NonNegativeFit, solveNonNegative } from './stats/non-negative-fit.js';
export { normalCdf, normalQuantile } from './stats/normal.js';
export { type SignFlipTest, signFlipTest } from './stats/permutation.js';
export { integralCovariance, type NoiseExponent } from './stats/power-law-covariance.js';
export { median, quantile, quantileSorted, sortedCopy } from './stats/quantile.js';
export { type RandomStream, randomStream } from './stats/random.js';
export {
  circularErrorFactor,
  type PlanarError,
  radialErrorCdf,
  radialErrorQuantile,
} from './stats/rayleigh.js';
export { type RobustLine, robustLine } from './stats/robust-line.js';
export { solveIncreasing } from './stats/solve-increasing.js';
export { studentTCdf, studentTQuantile } from './stats/student-t.js';
export {
  mean,
  medianAbsoluteDeviation,
  rootMeanSquare,
  standardDeviation,
  weightedMedian,
} from './stats/summary.js';
export { buildTable } from './tables/build.js';
export { csvText } from './tables/csv-text.js';
export { filterRows, type ShownTable } from './tables/filter-rows.js';
export {
  hashOfBytes,
  hashOfValue,
  madeTheSame,
  methodMetadata,
  type Provenance,
  provenanceMetadata,
} from './tables/provenance.js';
export {
  anyColumnsOf,
  columnsOf,
  readColumns,
  readStored,
  readStoredIfSound,
  readTable,
  type StoredTable,
} from './tables/read.js';
export { type JsonCell, rowsOf } from './tables/rows.js';
export {
  type Attitude,
  attitudeTable,
  type Checkpoints,
  checkpointsTable,
  type Findings,
  findingsTable,
  type Headings,
  headingsTable,
  type Motion,
  motionTable,
  type Path,
  pathTable,
  type ReadingsAccel,
  type ReadingsBaro,
  type ReadingsGyro,
  type ReadingsImport,
  type ReadingsMag,
  readingsAccelTable,
  readingsBaroTable,
  readingsGyroTable,
  readingsImportTable,
  readingsMagTable,
  type Steps,
  type Strides,
  stepsTable,
  stridesTable,
} from './tables/schemas.js';
export {
  GROUP_STATISTICS,
  type GroupStatistic,
  groupScoresTable,
  intervalColumn,
  type StepScores,
  stepScoresTable,
  type WalkScores,
  walkScoresTable,
} from './tables/score-schemas.js';
// Tables
export {
  type AnyColumns,
  bool,
  type ColumnSpec,
  type Columns,
  type ColumnType,
  type ColumnValues,
  defineTable,
  f64,
  i32,
  optionalF64,
  rowCount,
  type TableSpec,
  utf8,
} from './tables/spec.js';
export { writeTable, writeText, writeWhole } from './tables/write.js';
