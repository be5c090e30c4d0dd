import type { z } from 'zod';
import { AppError, describe } from '../errors.ts';

/** Issues told at once; the rest is counted. */
const MAX_TOLD = 5;

type RawIssue = Parameters<z.core.$ZodErrorMap>[0];
type PathPart = string | number | symbol;

/** One thing wrong with a JSON value: its place, and a sentence that says the place, what must be and what came. */
export interface Problem {
  readonly path: string;
  readonly text: string;
}

/** Everything wrong with a JSON value, in the schema's order; empty when it fits. */
export function findProblems(schema: z.ZodType, json: unknown): Problem[] {
  const parsed = schema.safeParse(json, { error: mustBe });
  if (parsed.success) return [];
  return parsed.error.issues.flatMap((issue) => sentencesOf(issue, json));
}

/** A JSON value checked against a schema, or an error that says where, what must be and what came. */
export function parseWith<T extends z.ZodType>(schema: T, json: unknown): z.output<T> {
  const parsed = schema.safeParse(json, { error: mustBe });
  if (parsed.success) return parsed.data;
  // A file of another kind fails everywhere: only its kind is worth telling.
  const kind = parsed.error.issues.filter((issue) => issue.path[0] === 'format' || issue.path[0] === 'version');
  const sentences = (kind.length > 0 ? kind : parsed.error.issues).flatMap((issue) => sentencesOf(issue, json));
  const told = sentences.slice(0, MAX_TOLD).map((sentence) => sentence.text);
  if (sentences.length > MAX_TOLD) told.push(`… and ${sentences.length - MAX_TOLD} more`);
  throw new AppError('input', told.join('\n'), sentences[0]?.path ?? '');
}

/** `nets[3].traces[0].widthMm`; the whole file is "the file". */
function pathText(parts: readonly PathPart[]): string {
  let text = '';
  for (const part of parts) {
    if (typeof part === 'number') text += `[${part}]`;
    else if (/^[A-Za-z_$][\w$]*$/.test(String(part))) text += text === '' ? String(part) : `.${String(part)}`;
    else text += `[${describe(String(part))}]`;
  }
  return text === '' ? 'the file' : text;
}

function sentencesOf(issue: z.core.$ZodIssue, json: unknown): Problem[] {
  const paths = issue.code === 'unrecognized_keys' ? issue.keys.map((key) => [...issue.path, key]) : [issue.path];
  return paths.map((parts) => {
    const path = pathText(parts);
    return { path, text: `${path} must be ${issue.message}; received ${shortly(valueAt(json, parts))}` };
  });
}

function valueAt(json: unknown, parts: readonly PathPart[]): unknown {
  let value = json;
  for (const part of parts) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, part)) return undefined;
    value = (value as Record<PathPart, unknown>)[part];
  }
  return value;
}

/** Long lists and objects are named, not printed: they may be as large as the file. */
function shortly(value: unknown): string {
  if (Array.isArray(value)) return value.length > 8 ? `a list of ${value.length}` : describeFlat(value);
  if (typeof value === 'object' && value !== null) return 'an object';
  return describe(value);
}

const describeFlat = (list: readonly unknown[]): string =>
  list.every((item) => typeof item !== 'object' || item === null) ? describe(list) : `a list of ${list.length}`;

const TYPE_WORDS: Readonly<Record<string, string>> = {
  number: 'a number',
  int: 'a whole number',
  string: 'a text',
  boolean: 'true or false',
  array: 'a list',
  tuple: 'a list',
  object: 'an object',
};

/** The "must be" half of a message, for every kind of issue the schemas can raise. */
function mustBe(issue: RawIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return TYPE_WORDS[issue.expected] ?? issue.expected;
    case 'too_small':
      return bound(issue.origin, issue.inclusive ? 'at least' : 'greater than', issue.minimum);
    case 'too_big':
      return bound(issue.origin, issue.inclusive ? 'at most' : 'less than', issue.maximum);
    case 'invalid_value':
      return issue.values.map((value) => JSON.stringify(value)).join(' or ');
    case 'unrecognized_keys':
      return `left out: this key is not known here (known: ${knownKeys(issue.inst).join(', ')})`;
    case 'invalid_union':
      return (
        optionsOf(issue)
          .map((option) => JSON.stringify(option))
          .join(' or ') || 'one of the allowed forms'
      );
    default:
      return issue.message ?? 'valid';
  }
}

const optionsOf = (issue: object): readonly unknown[] =>
  'options' in issue && Array.isArray(issue.options) ? issue.options : [];

function bound(origin: string, relation: string, limit: number | bigint): string {
  if (origin === 'array') return `a list of ${relation} ${limit} ${Number(limit) === 1 ? 'entry' : 'entries'}`;
  if (origin === 'string') return `a text of ${relation} ${limit} ${Number(limit) === 1 ? 'character' : 'characters'}`;
  return `a number ${relation} ${limit}`;
}

function knownKeys(schema: unknown): string[] {
  const shape = (schema as { _zod?: { def?: { shape?: object } } } | undefined)?._zod?.def?.shape;
  return shape === undefined ? [] : Object.keys(shape);
}
