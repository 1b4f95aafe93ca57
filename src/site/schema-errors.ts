// What a schema validator found, in plain words with a mend.

import type { OutputUnit } from '@cfworker/json-schema';
import type { JSONPath } from 'jsonc-parser';

/** Trouble at a place in the file. */
export interface Finding {
  readonly path: JSONPath;
  readonly code: string;
  readonly what: string;
  readonly mend: string;
}

/** What of a schema the messages need. */
export interface SchemaPart {
  readonly [keyword: string]: unknown;
  readonly enum?: readonly unknown[];
  readonly required?: readonly string[];
  readonly properties?: Readonly<Record<string, SchemaPart>>;
  readonly description?: string;
}

/** Keywords that only say that something below them is wrong. */
const WRAPPERS = new Set(['properties', 'items', 'if', 'then', 'else', 'additionalProperties', 'prefixItems', 'allOf']);

/** The findings among a validator's output, one a place and kind. */
export function findingsOf(schema: SchemaPart, instance: unknown, errors: readonly OutputUnit[]): Finding[] {
  const findings: Finding[] = [];
  for (const { keyword, keywordLocation, instanceLocation, error } of errors) {
    const path = stepsOf(instanceLocation).map((step) => (/^\d+$/u.test(step) ? Number(step) : step));
    if (keyword === 'false') {
      findings.push(unknownKey(schema, instance, path));
      continue;
    }
    if (WRAPPERS.has(keyword)) continue;
    const part = partAt(schema, stepsOf(keywordLocation).slice(0, -1));
    const value = valueAt(instance, path);
    if (keyword === 'required') findings.push(...missingKeys(part, value, path));
    else findings.push(wrongValue(keyword, part, value, path, error));
  }
  return findings;
}

function unknownKey(schema: SchemaPart, instance: unknown, path: JSONPath): Finding {
  const key = String(path.at(-1) ?? '');
  const known = keysAround(schema, instance, path.slice(0, -1));
  const near = nearest(key, known);
  return {
    path,
    code: 'site/unknown-key',
    what: `The key “${key}” is not known here.`,
    mend: near === undefined ? `Known keys are: ${known.join(', ')}.` : `Did you mean “${near}”?`,
  };
}

function missingKeys(part: SchemaPart, value: unknown, path: JSONPath): Finding[] {
  const present = Object.keys(value ?? {});
  return (part.required ?? [])
    .filter((key) => !present.includes(key))
    .map((key) => ({
      path,
      code: 'site/missing-key',
      what: `The key “${key}” is missing.`,
      mend: `Add it${part.properties?.[key]?.description === undefined ? '' : ` (${part.properties[key].description})`}.`,
    }));
}

function wrongValue(keyword: string, part: SchemaPart, value: unknown, path: JSONPath, error: string): Finding {
  const limit = String(part[keyword]);
  const shown = JSON.stringify(value) ?? 'nothing';
  const said = (what: string, mend: string): Finding => ({ path, code: 'site/wrong-value', what, mend });
  switch (keyword) {
    case 'type': {
      const wanted = [part['type']].flat().map((type) => KINDS[String(type)] ?? String(type));
      return said(`${clipped(shown)} stands where ${wanted.join(' or ')} belongs.`, `Write ${wanted.join(' or ')}.`);
    }
    case 'enum':
      return said(`${clipped(shown)} is none of the choices.`, `Choose one of: ${(part.enum ?? []).join(', ')}.`);
    case 'const':
      return said(`${clipped(shown)} is not possible here.`, `Write ${JSON.stringify(part['const'])}.`);
    case 'minimum':
      return said(`${shown} is too small.`, `Give at least ${limit}.`);
    case 'maximum':
      return said(`${shown} is too large.`, `Give at most ${limit}.`);
    case 'exclusiveMinimum':
      return said(`${shown} is too small.`, `Give more than ${limit}.`);
    case 'minItems':
      return said('The list is too short.', `Give at least ${limit} entries.`);
    case 'maxItems':
      return said('The list is too long.', `Give at most ${limit} entries.`);
    case 'minLength':
      return said('The text is empty.', 'Write something, or leave the key out.');
    case 'uniqueItems':
      return said('An entry stands twice in the list.', 'Name each once.');
    default:
      return said(error, 'Compare with the schema of the site file.');
  }
}

const KINDS: Readonly<Record<string, string>> = {
  number: 'a number',
  integer: 'a whole number',
  string: 'a text',
  object: 'an object { … }',
  array: 'a list [ … ]',
};

function clipped(text: string): string {
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}

function stepsOf(pointer: string): string[] {
  return pointer
    .split('/')
    .slice(1)
    .map((step) => decodeURIComponent(step).replace(/~1/gu, '/').replace(/~0/gu, '~'));
}

function partAt(schema: SchemaPart, steps: readonly string[]): SchemaPart {
  return steps.reduce<SchemaPart>((part, step) => (part[step] as SchemaPart | undefined) ?? {}, schema);
}

function valueAt(instance: unknown, path: JSONPath): unknown {
  return path.reduce<unknown>(
    (value, step) => (value as Record<string | number, unknown> | undefined)?.[step],
    instance,
  );
}

/** The keys that an object at this place may have. */
function keysAround(schema: SchemaPart, instance: unknown, path: JSONPath): string[] {
  let part = schema;
  for (const step of path) {
    const next = typeof step === 'number' ? part['items'] : part.properties?.[step];
    part = (next as SchemaPart | undefined) ?? {};
    if (part['else'] !== undefined && typeof valueAt(instance, path) === 'object') part = part['else'] as SchemaPart;
  }
  return Object.keys(part.properties ?? {}).filter((key) => !key.startsWith('$'));
}

/** The known word that differs least, if little enough. */
function nearest(word: string, known: readonly string[]): string | undefined {
  const ranked = known
    .map((candidate) => ({ candidate, changes: changesBetween(word.toLowerCase(), candidate) }))
    .sort((a, b) => a.changes - b.changes);
  const best = ranked[0];
  return best !== undefined && best.changes <= Math.max(2, Math.floor(word.length / 2)) ? best.candidate : undefined;
}

/** Letters to add, drop or change (Levenshtein 1966). */
function changesBetween(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, k) => k);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      next.push(Math.min(row[j]! + 1, next[j - 1]! + 1, row[j - 1]! + (a[i - 1] === b[j - 1] ? 0 : 1)));
    }
    row = next;
  }
  return row[b.length]!;
}
