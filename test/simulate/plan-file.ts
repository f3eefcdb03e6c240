import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll } from 'vitest';
import { castOf, simulateWalks } from '../../src/simulate/cast.js';
import { readPlan, type SimulationPlan } from '../../src/simulate/read-plan.js';
import type { SimulatedWalk } from '../../src/simulate/simulate-walk.js';

const made: string[] = [];

/** An empty folder, removed after the file's last test. */
export function emptyFolder(): string {
  const dir = mkdtempSync(join(tmpdir(), 'treadline-simulate-'));
  made.push(dir);
  return dir;
}

afterAll(() => {
  for (const dir of made.splice(0)) rmSync(dir, { recursive: true, force: true });
});

/** A plan of plans/. */
export function planNamed(name: string): SimulationPlan {
  return readPlan(fileURLToPath(new URL(`plans/${name}.yaml`, import.meta.url)));
}

/** A plan of some YAML text, put in a file `PLAN.yaml`. */
export function planOf(text: string): SimulationPlan {
  const path = join(emptyFolder(), 'PLAN.yaml');
  writeFileSync(path, text);
  return readPlan(path);
}

/** The plan's walks, simulated and not written. */
export function walksOf(plan: SimulationPlan): SimulatedWalk[] {
  return [...simulateWalks(castOf(plan))];
}
