// Reads a site file: JSON (comments allowed), held against its schema and against itself; an error names line, key, mend.

import { Validator, type Schema } from '@cfworker/json-schema';
import { getNodePath, getNodeValue, parseTree, printParseErrorCode, type Node, type ParseError } from 'jsonc-parser';
import schema from '../../static/schema/site.schema.json' with { type: 'json' };
import type { Problem } from '../air/index.ts';
import { crossChecks } from './cross-checks.ts';
import { lineAt, lineOf, pathInWords } from './place-in-text.ts';
import { findingsOf, type Finding } from './schema-errors.ts';
import { siteOfFile, type SiteFile } from './site-file.ts';
import type { Site } from './site.ts';

/** A site file of more characters than this is something else. */
const LONGEST = 4 * 2 ** 20;

const validator = new Validator(schema as Schema, '2020-12', false);

/**
 * Reads the text of a site file.
 * @param name of the file, for the messages
 * @returns the site, or null with every problem that was found
 */
export function readSite(text: string, name: string): { site: Site | null; problems: Problem[] } {
  const refused = (code: string, what: string, mend: string, line = 1): { site: null; problems: Problem[] } => ({
    site: null,
    problems: [problem(code, what, mend, name, line)],
  });
  if (text.length > LONGEST) {
    return refused('site/too-large', 'The file is too large for a site file.', 'Check that it is the right file.');
  }
  const plain = text.replace(/^\ufeff/u, '');
  try {
    const errors: ParseError[] = [];
    const root = parseTree(plain, errors, { allowTrailingComma: true });
    if (plain.trim() === '' || root === undefined) {
      return refused('site/no-json', 'The file is empty.', 'Write at least {"name": "…"} into it.');
    }
    const [first] = errors;
    if (first !== undefined) {
      const mend = 'Check brackets, quotation marks and commas at this line.';
      return refused('site/no-json', `This is no JSON: ${inWords(first)}.`, mend, lineAt(plain, first.offset));
    }
    return siteOf(root, plain, name);
  } catch (error) {
    // Brackets nested thousands deep exhaust any parser.
    if (!(error instanceof RangeError)) throw error;
    return refused('site/no-json', 'The brackets are nested too deep.', 'Check that it is the right file.');
  }
}

function siteOf(root: Node, text: string, name: string): { site: Site | null; problems: Problem[] } {
  const value: unknown = getNodeValue(root);
  const bySchema = [...doubledKeys(root), ...findingsOf(schema, value, validator.validate(value).errors)];
  const findings = bySchema.length > 0 ? bySchema : crossChecks(value as SiteFile);
  const problems = findings.map(({ code, what, mend, path }) =>
    problem(code, what, mend, name, lineOf(root, text, path), pathInWords(path)),
  );
  return { site: problems.length > 0 ? null : siteOfFile(value as SiteFile), problems };
}

/** Keys that stand twice in one object, of which JSON would keep the last in silence. */
function doubledKeys(node: Node): Finding[] {
  const seen = new Set<string>();
  const findings: Finding[] = [];
  for (const child of node.children ?? []) {
    const key = child.type === 'property' ? (child.children?.[0]?.value as string) : undefined;
    if (key === undefined) {
      findings.push(...doubledKeys(child));
      continue;
    }
    if (seen.has(key)) {
      findings.push({
        path: getNodePath(child.children![1] ?? child),
        code: 'site/doubled-key',
        what: `The key “${key}” stands twice.`,
        mend: 'Keep one of them.',
      });
    }
    seen.add(key);
    findings.push(...doubledKeys(child));
  }
  return findings;
}

function problem(code: string, what: string, mend: string, source: string, line: number, key = ''): Problem {
  return { code, what, mend, where: { source, line, ...(key === '' ? {} : { key }) } };
}

function inWords({ error }: ParseError): string {
  return printParseErrorCode(error)
    .replace(/([a-z])([A-Z])/gu, '$1 $2')
    .toLowerCase()
    .replace(/^(\S+) expected$/u, '$1 expected');
}
