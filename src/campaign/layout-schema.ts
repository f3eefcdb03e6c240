import { z } from 'zod';

const COLUMN_RULE = 'must be a column name, or a column number from 1';
const column = z
  .union([z.string().min(1, COLUMN_RULE), z.int().min(1, COLUMN_RULE)], COLUMN_RULE)
  .describe('A column by its name in the header, or by its number from 1.');

const time = z
  .strictObject({ column, unit: z.enum(['s', 'ms', 'us', 'ns']) })
  .describe('The column of time stamps and their unit.');

/** What every sensor of a layout may say besides its unit. */
const shared = {
  tag: z
    .union([z.string().min(1), z.number()])
    .optional()
    .describe("Only in `tagged`: the tag column's value in this sensor's rows."),
  file: z
    .string()
    .min(1)
    .optional()
    .describe("Only in `split`: the sensor's file in the folder that walks.csv names as the log."),
  time: time
    .optional()
    .describe("Only in `split`: the file's own time column where it differs from the layout's."),
};

const three = z.array(column).length(3, 'must name 3 columns: x, y, z');
const one = z.array(column).length(1, 'must name 1 column');

/** Units that a sensor's columns may have. */
export const SENSOR_UNITS = {
  accel: ['mps2', 'g'],
  gyro: ['radps', 'degps'],
  mag: ['uT', 'mT', 'nT', 'gauss'],
  baro: ['hPa', 'Pa', 'kPa'],
} as const;

const AXES = ['x', 'y', 'z', '-x', '-y', '-z'] as const;
const SENSORS = ['accel', 'gyro', 'mag', 'baro'] as const;

const fields = z.strictObject({
  shape: z.enum(['wide', 'tagged', 'split']),
  time,
  tag: column.optional().describe('Only in `tagged`: the column that says which sensor a row is of.'),
  accel: z.strictObject({
    columns: three,
    unit: z.enum(SENSOR_UNITS.accel),
    sign: z.enum(['specific-force', 'gravity-directed']).default('specific-force'),
    ...shared,
  }),
  gyro: z.strictObject({ columns: three, unit: z.enum(SENSOR_UNITS.gyro), ...shared }).optional(),
  mag: z.strictObject({ columns: three, unit: z.enum(SENSOR_UNITS.mag), ...shared }).optional(),
  baro: z.strictObject({ columns: one, unit: z.enum(SENSOR_UNITS.baro), ...shared }).optional(),
  axes: z.array(z.enum(AXES)).length(3, 'must have 3 entries').default(['x', 'y', 'z']),
  delimiter: z
    .enum([',', ';', '\t', '|', ' ', 'tab', 'space'])
    .optional()
    .describe('CSV: what separates the fields; found out from the file where not given.'),
  decimal: z
    .enum(['.', ','])
    .optional()
    .describe('CSV: the decimal sign; found out from the file where not given.'),
  header: z
    .boolean()
    .optional()
    .describe('CSV: whether the first line names the columns; found out where not given.'),
});

/**
 * One entry under `layouts` of campaign.yaml: how a device's log files are read.
 *
 * ```yaml
 * recorder-a:
 *   shape: wide            # wide: a row a sample | tagged: a row a reading | split: a file a sensor
 *   time: { column: timestamp, unit: ns }                 # s | ms | us | ns
 *   tag: sensor                                           # tagged only: the column that says which sensor
 *   accel:
 *     columns: [ax, ay, az]                               # names, or numbers from 1
 *     unit: mps2                                          # mps2 | g
 *     sign: specific-force                                # default; or gravity-directed, which is negated
 *     tag: acc                                            # tagged only
 *     file: accel.csv                                     # split only
 *     time: { column: t, unit: ms }                       # split only, where it differs
 *   gyro: { columns: [gx, gy, gz], unit: radps }          # optional; radps | degps
 *   mag: { columns: [mx, my, mz], unit: uT }              # optional; uT | mT | nT | gauss
 *   baro: { columns: [p], unit: hPa }                     # optional; hPa | Pa | kPa
 *   axes: [x, y, z]        # default; device axes in terms of the file's, e.g. [-y, x, z]
 *   delimiter: ';'         # optional: , ; | tab space
 *   decimal: ','           # optional: . or ,
 *   header: true           # optional
 * ```
 */
export const layoutSchema = fields.superRefine((layout, context) => {
  const refuse = (path: PropertyKey[], message: string) =>
    context.addIssue({ code: 'custom', path, message });
  if (layout.shape === 'tagged' && layout.tag === undefined)
    refuse(['tag'], 'is missing; a tagged layout must name the column that says which sensor');
  if (layout.shape !== 'tagged' && layout.tag !== undefined)
    refuse(['tag'], `only a tagged layout has a tag column, this one is ${layout.shape}`);
  if (new Set(layout.axes.map((axis) => axis.slice(-1))).size !== 3)
    refuse(['axes'], `must name each of x, y, z once, got [${layout.axes.join(', ')}]`);
  if (layout.delimiter === ',' && layout.decimal === ',')
    refuse(['decimal'], 'the comma cannot be both delimiter and decimal sign');
  const tags = new Map<string, string>();
  const named = [layout.time.column, layout.tag];
  for (const sensor of SENSORS) {
    const part = layout[sensor];
    if (!part) continue;
    named.push(...part.columns, part.time?.column);
    if (new Set(part.columns).size !== part.columns.length)
      refuse([sensor, 'columns'], `names a column twice: [${part.columns.join(', ')}]`);
    if (layout.shape === 'tagged') {
      if (part.tag === undefined)
        refuse([sensor, 'tag'], "is missing; a tagged layout must say which rows are this sensor's");
      else if (tags.has(String(part.tag)))
        refuse([sensor, 'tag'], `"${part.tag}" is the tag of ${tags.get(String(part.tag))} already`);
      else tags.set(String(part.tag), sensor);
    } else if (part.tag !== undefined)
      refuse([sensor, 'tag'], `only a tagged layout has tags, this one is ${layout.shape}`);
    if (layout.shape === 'split') {
      if (part.file === undefined)
        refuse([sensor, 'file'], "is missing; a split layout must name each sensor's file");
    } else {
      if (part.file !== undefined)
        refuse([sensor, 'file'], `only a split layout has a file per sensor, this one is ${layout.shape}`);
      if (part.time !== undefined)
        refuse(
          [sensor, 'time'],
          `only a split layout has a time column per sensor, this one is ${layout.shape}`,
        );
    }
  }
  const text = named.find((ref) => typeof ref === 'string');
  if (layout.header === false && text !== undefined)
    refuse(
      ['header'],
      `column "${text}" is given by name, which needs a header line; give numbers from 1, or header: true`,
    );
});
