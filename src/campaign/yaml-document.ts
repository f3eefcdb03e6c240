import { isMap, isScalar, LineCounter, type Node, parseDocument } from 'yaml';
import type { z } from 'zod';
import { messageOf } from '../errors.js';
import { didYouMean } from './nearest-name.js';
import type { Problems } from './problems.js';

type Issue = z.core.$ZodIssue;

/** As much of a zod schema as is needed to find the keys that an object may have. */
interface Inner {
  innerType?: z.ZodType;
  options?: readonly z.ZodType[];
  shape?: Record<string, z.ZodType>;
  valueType?: z.ZodType;
  element?: z.ZodType;
}

/** The keys that the schema allows at a path, over all alternatives. */
function keysAt(schema: z.ZodType, path: readonly PropertyKey[]): string[] {
  const def = schema.def as unknown as Inner;
  if (def.innerType) return keysAt(def.innerType, path);
  if (def.options) return def.options.flatMap((option) => keysAt(option, path));
  const [key, ...rest] = path;
  if (key === undefined) return def.shape ? Object.keys(def.shape) : [];
  const child = def.shape?.[String(key)] ?? def.valueType ?? def.element;
  return child ? keysAt(child, rest) : [];
}

function show(value: unknown): string {
  const text = JSON.stringify(value) ?? String(value);
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

/** What is wrong with a union's value, told by the one alternative that it is meant for, where there is one. */
function opened(issue: Issue, parent: readonly PropertyKey[] = []): Issue[] {
  const path = [...parent, ...issue.path];
  if (issue.code !== 'invalid_union') return [{ ...issue, path } as Issue];
  const meant = issue.errors.filter((issues) =>
    issues.every((inner) => inner.path.length > 0 || inner.code === 'unrecognized_keys'),
  );
  return meant.length === 1
    ? meant[0]!.flatMap((inner) => opened(inner, path))
    : [{ ...issue, path } as Issue];
}

function describe(issue: Issue, got: unknown): string {
  if (issue.code === 'custom') return issue.message;
  if (got === undefined) return 'is missing; it must be given';
  if (issue.code === 'invalid_value') {
    const allowed = issue.values.map((value) => (value === '\t' ? 'tab' : String(value)));
    const hint = typeof got === 'string' ? didYouMean(got, allowed) : '';
    return `got ${show(got)}; allowed: ${allowed.join(', ')}${hint && `.${hint}`}`;
  }
  const rule = issue.message.replace(/^Invalid input: /, '').replace(/, received .*$/, '');
  return `${rule}, got ${show(got)}`;
}

/** Plain data of a YAML text, and where its keys and values stand. */
interface Source {
  data: unknown;
  /** `file:line:column` of a value, or of what is around it where there is none. */
  at(path: readonly PropertyKey[]): string;
  /** `file:line:column` of the key that a path ends in. */
  atKey(path: readonly PropertyKey[]): string;
}

/** Null where the text is not YAML (reported). */
function parse(text: string, file: string, problems: Problems): Source | null {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, prettyErrors: false });
  const place = (offset: number) => {
    const { line, col } = lines.linePos(offset);
    return `${file}:${Math.max(line, 1)}:${Math.max(col, 1)}`;
  };
  const placeOf = (node: unknown) => place((node as Node | null)?.range?.[0] ?? 0);
  const nodeNear = (path: readonly PropertyKey[]): unknown => {
    for (let length = path.length; length > 0; length--) {
      const node = document.getIn(path.slice(0, length), true);
      if (node) return node;
    }
    return document.contents;
  };
  for (const error of document.errors)
    problems.add(`${place(error.pos[0])} ${error.message.replaceAll(/\s+/g, ' ')}`);
  if (document.errors.length > 0) return null;
  let data: unknown;
  try {
    // A few lines of aliases of aliases could otherwise fill the memory.
    data = document.toJS({ maxAliasCount: 100 });
  } catch (error) {
    problems.add(`${file}:1:1 its aliases cannot be expanded (${messageOf(error)}); write the values out`);
    return null;
  }
  return {
    data,
    at: (path) => placeOf(nodeNear(path)),
    atKey: (path) => {
      const parent = nodeNear(path.slice(0, -1));
      const pair = isMap(parent)
        ? parent.items.find(({ key }) => isScalar(key) && String(key.value) === String(path.at(-1)))
        : undefined;
      return placeOf(pair?.key ?? parent);
    },
  };
}

/**
 * Reads YAML into what a zod schema promises; whatever is wrong is reported with its line and column.
 *
 * @param file - the name that messages use.
 * @returns null where anything is wrong.
 */
export function readYaml<S extends z.ZodType>(
  text: string,
  file: string,
  schema: S,
  problems: Problems,
): z.output<S> | null {
  const source = parse(text, file, problems);
  if (!source) return null;
  const result = schema.safeParse(source.data);
  if (result.success) return result.data;
  for (const issue of result.error.issues.flatMap((each) => opened(each))) {
    const { path } = issue;
    if (issue.code === 'unrecognized_keys') {
      const allowed = [...new Set(keysAt(schema, path))];
      for (const key of issue.keys)
        problems.add(
          `${source.atKey([...path, key])} ${[...path.map(String), key].join('.')}: unknown key; ` +
            `allowed: ${allowed.join(', ')}.${didYouMean(key, allowed)}`,
        );
      continue;
    }
    const got = path.reduce<unknown>(
      (node, key) => (node as Record<PropertyKey, unknown> | null | undefined)?.[key],
      source.data,
    );
    problems.add(`${source.at(path)} ${path.map(String).join('.') || 'the file'}: ${describe(issue, got)}`);
  }
  return null;
}
