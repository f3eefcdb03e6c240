import { describe, expect, test } from 'vitest';
import type { PassContext, StartContext } from '../../../src/campaign/context.js';
import { pathStage } from '../../../src/stages/path/index.js';
import { randomStream } from '../../../src/stats/random.js';
import type { Headings, Path, Steps, Strides } from '../../../src/tables/schemas.js';
import { walkContext } from '../walk-context.js';

const method = pathStage.methods['dead-reckoning']!;

/** A walk of equal steps along given headings (degrees), with sds. */
function inputs(headingsDeg: number[], length = 0.7, lengthSd = 0.07, headingSdDeg = 6) {
  const n = headingsDeg.length;
  const t_s = Float64Array.from({ length: n }, (_, i) => 0.5 * (i + 1));
  const step = Int32Array.from({ length: n }, (_, i) => i + 1);
  const steps: Steps = {
    step,
    t_s,
    start_s: t_s.map((t) => t - 0.25),
    end_s: t_s.map((t) => t + 0.25),
    strength_mps2: new Float64Array(n),
    confidence: new Float64Array(n),
    bout: new Int32Array(n).fill(1),
  };
  const strides: Strides = {
    step,
    length_m: new Float64Array(n).fill(length),
    sd_m: new Float64Array(n).fill(lengthSd),
    cadence_hz: new Float64Array(n).fill(2),
  };
  const headings: Headings = {
    step,
    heading_rad: Float64Array.from(headingsDeg, (d) => (d * Math.PI) / 180),
    sd_rad: new Float64Array(n).fill((headingSdDeg * Math.PI) / 180),
    offset_rad: new Float64Array(n),
    source: new Array<string>(n).fill('device-axis'),
  };
  return { steps, strides, headings };
}
const startAt = (parts: Partial<StartContext> = {}): StartContext => ({
  checkpoint: 'c1',
  east_m: 10,
  north_m: 20,
  sigma_m: 0.2,
  t_s: null,
  sigma_s: 0,
  heading_rad: null,
  ...parts,
});
const run = (
  input: ReturnType<typeof inputs>,
  settings: object = {},
  context = walkContext({ start: startAt() }),
) => method.run(input, method.settings.parse(settings), context);

describe('dead-reckoning', () => {
  test('adds the displacements to the start: east for 90 degrees, north for 0', () => {
    const path = run(inputs([90, 90, 0, 0]));
    expect([...path.step]).toEqual([0, 1, 2, 3, 4]);
    expect(path.east_m[4]).toBeCloseTo(11.4, 12);
    expect(path.north_m[4]).toBeCloseTo(21.4, 12);
    expect(path.t_s[0]).toBe(0.25);
    expect(path.t_s[4]).toBe(2.25);
  });

  test('a start in the middle of a step keeps the share of it that came after', () => {
    const path = run(inputs([90, 90, 90]), {}, walkContext({ start: startAt({ t_s: 1.0 }) }));
    // Step 2 spans 0.75 to 1.25 s: half of it is left, and step 3.
    expect([...path.step]).toEqual([0, 2, 3]);
    expect(path.east_m[2]).toBeCloseTo(10 + 0.35 + 0.7, 12);
    expect(path.t_s[0]).toBe(1.0);
  });

  test('no steps: the start alone; no start: from the origin', () => {
    expect(run(inputs([])).east_m).toHaveLength(1);
    expect(run(inputs([0]), {}, walkContext()).north_m[1]).toBeCloseTo(0.7, 12);
  });

  test('the covariance is that of ten thousand walks drawn from the same errors', () => {
    const headings = [...new Array<number>(40).fill(30), ...new Array<number>(30).fill(120)];
    const path = run(inputs(headings));
    const random = randomStream(11, 'walks');
    const scatter = (4 * Math.PI) / 180;
    const common = Math.sqrt(((6 * Math.PI) / 180) ** 2 - scatter ** 2);
    const commonLength = Math.sqrt(0.1 ** 2 - 0.06 ** 2);
    const walk = (0.3 * Math.PI) / 180;
    const draws = 10_000;
    let ee = 0;
    let en = 0;
    let nn = 0;
    for (let d = 0; d < draws; d++) {
      let e = 10 + 0.2 * random.normal();
      let n = 20 + 0.2 * random.normal();
      let psi = common * random.normal();
      const s = commonLength * random.normal();
      for (const deg of headings) {
        const h = (deg * Math.PI) / 180 + psi + scatter * random.normal();
        const length = 0.7 * (1 + s + 0.06 * random.normal());
        e += length * Math.sin(h);
        n += length * Math.cos(h);
        psi += walk * random.normal();
      }
      const de = e - path.east_m.at(-1)!;
      const dn = n - path.north_m.at(-1)!;
      ee += (de * de) / draws;
      en += (de * dn) / draws;
      nn += (dn * dn) / draws;
    }
    // 10,000 draws know a variance to 1.4 percent; linearisation at 6 degrees costs half a percent: 6 is four sigmas.
    expect(Math.abs(path.cov_ee_m2.at(-1)! / ee - 1)).toBeLessThan(0.06);
    expect(Math.abs(path.cov_nn_m2.at(-1)! / nn - 1)).toBeLessThan(0.06);
    expect(Math.abs(path.cov_en_m2.at(-1)! - en)).toBeLessThan(0.06 * Math.sqrt(ee * nn));
  });

  test('later anchors correct the path only where the recipe says so, and then take out a heading and length error', () => {
    const headings = [...new Array<number>(50).fill(0), ...new Array<number>(50).fill(90)];
    const turned = headings.map((h) => h + 8);
    const anchor = (east_m: number, north_m: number, t_s: number): PassContext => ({
      checkpoint: 'a',
      t_s,
      sigma_s: 0,
      role: 'anchor',
      east_m,
      north_m,
      sigma_m: 0.05,
    });
    // True steps are 0.7 m along the true headings; the tables say 0.65 m and 8 degrees too far right.
    const context = walkContext({
      start: startAt({ sigma_m: 0.05 }),
      passes: [anchor(10, 55, 25.25), anchor(45, 55, 50.25)],
    });
    const endError = (path: Path) => Math.hypot(path.east_m.at(-1)! - 45, path.north_m.at(-1)! - 55);
    expect(endError(run(inputs(turned, 0.65), {}, context))).toBeGreaterThan(5);
    const corrected = run(inputs(turned, 0.65), { anchors: 'all' }, context);
    expect(endError(corrected)).toBeLessThan(0.2);
    // Half way along the first leg, where no anchor stands, the error is spread as well.
    expect(Math.hypot(corrected.east_m[25]! - 10, corrected.north_m[25]! - 37.5)).toBeLessThan(0.5);
    expect(corrected.cov_nn_m2.at(-1)!).toBeLessThan(0.02);
  });
});
