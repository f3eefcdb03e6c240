import type { z } from 'zod';
import type { WalkContext } from '../campaign/context.js';
import type { AnyColumns, TableSpec } from '../tables/spec.js';

/**
 * One way to do a stage, chosen by name in a recipe.
 *
 * `run` is pure: no files, clock, random numbers, or changes to its inputs.
 */
export interface Method<In, Out, S extends z.ZodType = z.ZodType> {
  /** The published name, as a recipe writes it. */
  readonly name: string;
  /** Where the method is described. */
  readonly source: string;
  /** Raise when the same input may give another output. */
  readonly version: number;
  /** Settings with their defaults, ranges and units (in the key's ending). */
  readonly settings: S;
  /** Tables beyond the stage's own needs without which this method cannot run. */
  readonly requires?: readonly string[];
  /**
   * Parts of the walk's context that `run` may see, with these settings; a change of any of them runs the stage
   * again. The others are not there when it runs.
   */
  readonly uses: ContextParts | ((settings: z.output<S>) => ContextParts);
  run(inputs: In, settings: z.output<S>, context: WalkContext): Out;
}

export type ContextParts = readonly (keyof WalkContext)[];

/** The parts of the context that a method uses with the given settings. */
export function partsUsed<S extends z.ZodType>(
  method: Pick<Method<never, unknown, S>, 'uses'>,
  settings: z.output<S>,
): ContextParts {
  return typeof method.uses === 'function' ? method.uses(settings) : method.uses;
}

/** A pure function from tables to one table, named after the table it writes. */
export interface Stage<In extends object = object, Out extends object = object> {
  readonly name: string;
  readonly table: TableSpec;
  /** Tables it cannot do without. */
  readonly reads: readonly string[];
  /** Tables it uses where they are there. */
  readonly readsIfPresent: readonly string[];
  readonly methods: Readonly<Record<string, Method<In, Out>>>;
  readonly defaultMethod: string;
}

/** A stage seen by the pipeline, which does not know the columns' names. */
export type AnyStage = Stage<Record<string, AnyColumns | undefined>, AnyColumns>;

/** Keeps a method's types together at its definition. */
export function defineMethod<In, Out, S extends z.ZodType>(method: Method<In, Out, S>): Method<In, Out, S> {
  return method;
}

/** Declares a stage and registers its methods by their own names. */
export function defineStage<In extends object, Out extends object>(definition: {
  name: string;
  table: TableSpec;
  reads: readonly string[];
  readsIfPresent?: readonly string[];
  // biome-ignore lint/suspicious/noExplicitAny: each method has its own settings schema
  methods: readonly Method<In, Out, any>[];
  defaultMethod: string;
}): Stage<In, Out> {
  const methods: Record<string, Method<In, Out>> = {};
  for (const method of definition.methods) methods[method.name] = method;
  if (!methods[definition.defaultMethod])
    throw new Error(`stage ${definition.name}: default method ${definition.defaultMethod} is not registered`);
  return {
    name: definition.name,
    table: definition.table,
    reads: definition.reads,
    readsIfPresent: definition.readsIfPresent ?? [],
    methods,
    defaultMethod: definition.defaultMethod,
  };
}
