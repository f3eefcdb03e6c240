import { z } from 'zod';
import { campaignSchema } from '../campaign/campaign-yaml.js';
import { folderNameProblem } from '../campaign/folder-name.js';
import { didYouMean } from '../campaign/nearest-name.js';
import { CARRY_NAMES } from './carries.js';
import { deviceSchema } from './device-schema.js';
import { YOUNGEST_AGE } from './gait-norms.js';
import { STYLE_NAMES } from './gait-styles.js';

const positive = z.number().positive();
const name = z.string().min(1);

/** A place of `places` by name, or east and north in metres. */
const point = z.union(
  [name, z.tuple([z.number(), z.number()])],
  'must be the name of a place, or [east, north] in metres',
);

const groupSchema = z.strictObject({
  age: z
    .tuple([z.int().min(YOUNGEST_AGE).max(110), z.int().min(YOUNGEST_AGE).max(110)])
    .refine(([low, high]) => low <= high, 'must be [youngest, oldest] in years'),
  sex: z.enum(['any', 'female', 'male']).default('any'),
  gait: z.enum(STYLE_NAMES).default('normal'),
  cadence_hz: positive.max(3.5).optional().describe('Mean of the group; from the norms where not given.'),
  step_length_m: positive.max(1.3).optional(),
  time_variability: z.number().min(0).max(0.2).optional(),
  length_variability: z.number().min(0).max(0.3).optional(),
  asymmetry: z.number().min(0).max(0.4).optional(),
  bounce: z.number().min(0.05).max(1).optional(),
  heel_strike_mps2: z.number().min(0).max(20).optional(),
});

const walkerSchema = z.strictObject({
  walker: name,
  group: name,
  sex: z.enum(['female', 'male']).optional(),
  age: z.int().min(YOUNGEST_AGE).max(110).optional(),
  height_m: z.number().min(0.8).max(2.3).optional(),
  leg_m: z.number().min(0.35).max(1.3).optional(),
  mass_kg: positive.optional(),
  cadence_hz: z.number().min(0.3).max(3.5).optional(),
  step_length_m: z.number().min(0.05).max(1.3).optional(),
});

const pauseSchema = z
  .strictObject({
    at: name.optional().describe('A place that is a vertex of the route.'),
    at_m: z.number().min(0).optional().describe('Distance along the route.'),
    seconds: z.number().min(0.5),
    up_m: z.number().default(0).describe('Change of height while standing, as in a lift.'),
  })
  .refine(
    ({ at, at_m }) => (at === undefined) !== (at_m === undefined),
    'must say where: either at (a place) or at_m',
  );

const routeSchema = z
  .strictObject({
    points: z.array(point).min(1).optional().describe('A polyline; a single point is a walker who stands.'),
    corridors: z
      .strictObject({ length_m: positive, from: name.optional() })
      .optional()
      .describe('A random way along the LineString features of the floor plan.'),
    random: z
      .strictObject({
        legs: z.int().min(1).max(500),
        leg_m: z.tuple([z.number().min(1.5), z.number().min(1.5)]),
        within: z.tuple([z.number(), z.number(), z.number(), z.number()]).optional(),
      })
      .optional()
      .describe('Legs in random directions; within is [east, north, east, north] of two corners.'),
    level: name.optional(),
    up_m: z.number().default(0).describe('Height of the floor in the grid.'),
    checkpoints: z
      .union(
        [z.enum(['vertices', 'none']), z.strictObject({ every_m: z.number().min(1) })],
        'must be vertices, none, or { every_m: distance }',
      )
      .default('vertices'),
    pauses: z.array(pauseSchema).default([]),
    paces: z
      .array(
        z.strictObject({ from_m: z.number().min(0), to_m: positive, factor: z.number().min(0.1).max(2) }),
      )
      .default([])
      .describe('Changes of speed, as factors of the preferred one.'),
    initial_still_s: z.number().min(0.5).default(3),
    final_still_s: z.number().min(0.5).default(2),
  })
  .refine(
    (route) => [route.points, route.corridors, route.random].filter(Boolean).length === 1,
    'must have exactly one of points, corridors, random',
  );

const names = z.union([name, z.array(name).min(1)], 'must be a name or a list of names');
const carry = z.enum(CARRY_NAMES);

const walksSchema = z.strictObject({
  walk: name
    .optional()
    .describe('The name, or its beginning where the entry makes several walks; else w01, w02, ...'),
  walker: names.describe('`all`, a walker, or several.'),
  route: names,
  device: names.optional().describe('May be left out where there is one.'),
  carry: z
    .union([carry, z.array(carry).min(1)], `must be one or several of ${CARRY_NAMES.join(', ')}`)
    .default('hand'),
  changes: z
    .array(z.strictObject({ at_m: positive, carry }))
    .default([])
    .describe('Changes of carry in mid-walk.'),
  wander: z
    .number()
    .min(0)
    .default(1)
    .describe("Slow wander of the phone's angles, times that of the carry; 0 holds it still."),
  reverse: z.boolean().default(false),
  repeat: z.int().min(1).default(1),
});

const disturbanceSchema = z.strictObject({
  east_m: z.number(),
  north_m: z.number(),
  up_m: z.number().default(0),
  radius_m: positive.describe('Where the field has fallen to about a third of the peak.'),
  peak_uT: z.number(),
  azimuth_deg: z.number().default(0),
  dip_deg: z.number().min(-90).max(90).default(0),
});

/** PLAN.yaml: what {@link simulateCampaign} makes a campaign of. */
export const planSchema = z
  .strictObject({
    name,
    seed: z.int(),
    grid: campaignSchema.shape.grid,
    places: z
      .record(name, z.tuple([z.number(), z.number()]))
      .default({})
      .describe('Named points, east and north in m.'),
    floor_plan: name.optional().describe('GeoJSON beside the plan, in the grid.'),
    magnetic: z
      .strictObject({
        horizontal_uT: z.number().min(0).default(20),
        down_uT: z.number().default(45),
        disturbances: z.array(disturbanceSchema).default([]),
      })
      .prefault({})
      .describe('horizontal_uT and down_uT only where the grid has no origin and date for the field model.'),
    groups: z.record(name, groupSchema),
    walkers: z.array(walkerSchema).min(1),
    devices: z.record(name, deviceSchema),
    routes: z.record(name, routeSchema),
    walks: z.array(walksSchema).min(1),
    survey: z.strictObject({ sigma_m: z.number().min(0).default(0.05) }).prefault({}),
    passes: z
      .strictObject({
        sigma_s: z.number().min(0).default(0.2),
        anchors: z.enum(['start', 'ends', 'none']).default('start'),
      })
      .prefault({}),
    truth: z.strictObject({ rate_hz: positive.max(1000).default(25) }).prefault({}),
  })
  .superRefine((plan, context) => {
    const known = (path: PropertyKey[], word: string, words: string[], where: string) => {
      if (!words.includes(word))
        context.addIssue({
          code: 'custom',
          path,
          message: `"${word}" is not in ${where}; there are ${words.join(', ') || 'none'}.${didYouMean(word, words)}`,
        });
    };
    const list = (value: string | string[] | undefined) => (value === undefined ? [] : [value].flat());
    const walkers = plan.walkers.map(({ walker }) => walker);
    const places = Object.keys(plan.places);
    for (const [i, { walker, group }] of plan.walkers.entries()) {
      known(['walkers', i, 'group'], group, Object.keys(plan.groups), 'groups');
      if (walkers.indexOf(walker) !== i)
        context.addIssue({
          code: 'custom',
          path: ['walkers', i, 'walker'],
          message: `"${walker}" is there twice`,
        });
    }
    for (const [key, route] of Object.entries(plan.routes)) {
      for (const [i, at] of (route.points ?? []).entries())
        if (typeof at === 'string') known(['routes', key, 'points', i], at, places, 'places');
      for (const [i, pause] of route.pauses.entries())
        if (pause.at !== undefined) known(['routes', key, 'pauses', i, 'at'], pause.at, places, 'places');
      if (route.corridors?.from !== undefined)
        known(['routes', key, 'corridors', 'from'], route.corridors.from, places, 'places');
      if (route.corridors && plan.floor_plan === undefined)
        context.addIssue({
          code: 'custom',
          path: ['routes', key, 'corridors'],
          message: 'needs floor_plan: the GeoJSON whose LineString features are the corridors',
        });
    }
    for (const [i, walk] of plan.walks.entries()) {
      if (walk.walker !== 'all')
        for (const each of list(walk.walker)) known(['walks', i, 'walker'], each, walkers, 'walkers');
      for (const each of list(walk.route))
        known(['walks', i, 'route'], each, Object.keys(plan.routes), 'routes');
      for (const each of list(walk.device))
        known(['walks', i, 'device'], each, Object.keys(plan.devices), 'devices');
      if (walk.device === undefined && Object.keys(plan.devices).length !== 1)
        context.addIssue({
          code: 'custom',
          path: ['walks', i],
          message: 'device must be given where the plan has several',
        });
      const unsafe = walk.walk === undefined ? null : folderNameProblem(walk.walk);
      if (unsafe !== null)
        context.addIssue({ code: 'custom', path: ['walks', i, 'walk'], message: `"${walk.walk}" ${unsafe}` });
    }
  });

export type PlanYaml = z.output<typeof planSchema>;
export type GroupPlan = z.output<typeof groupSchema>;
export type WalkerPlan = z.output<typeof walkerSchema>;
export type RoutePlan = z.output<typeof routeSchema>;
export type WalksPlan = z.output<typeof walksSchema>;
export type DisturbancePlan = z.output<typeof disturbanceSchema>;
