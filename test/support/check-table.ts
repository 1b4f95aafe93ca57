// Runs the check tables of the outside data: inputs and expected outputs with stated tolerances.

import { describe, expect, it } from 'vitest';
import { readSharedJson, sharedIsHere } from './shared.ts';

export type CheckValue = null | boolean | string | number | CheckValue[] | { [key: string]: CheckValue };

interface Tolerance {
  abs?: number;
  rel?: number;
  modulo?: number;
}

export interface CheckCase {
  id: string;
  note?: string;
  in: Record<string, CheckValue>;
  out: Record<string, CheckValue>;
  contested?: unknown;
}

export interface CheckBlock {
  name: string;
  source: string;
  formula: string;
  tolerance: Record<string, Tolerance | string>;
  note?: string;
  cases: CheckCase[];
}

/** A block of a check table by name, `checkBlock('rotor', 'rews')`. */
export function checkBlock(file: string, name: string): CheckBlock {
  const table = readSharedJson(`checks/${file}.json`) as { blocks: CheckBlock[] };
  const block = table.blocks.find((candidate) => candidate.name === name);
  if (block === undefined) throw new Error(`checks/${file}.json has no block ${name}`);
  return block;
}

/** Compares with the table's own tolerance for the key; null in the table asks for NaN or null. */
export function expectAgrees(block: CheckBlock, key: string, got: unknown, want: CheckValue, label: string): void {
  if (Array.isArray(want)) {
    expect(got, label).toHaveLength(want.length);
    const list = got as ArrayLike<unknown>;
    want.forEach((value, index) => expectAgrees(block, key, list[index], value, `${label}[${index}]`));
    return;
  }
  if (want === null) {
    expect(
      got === null || got === undefined || Number.isNaN(got),
      `${label}: expected missing, got ${String(got)}`,
    ).toBe(true);
    return;
  }
  if (typeof want !== 'number') {
    expect(got, label).toEqual(want);
    return;
  }
  const tolerance = block.tolerance[key];
  if (typeof tolerance !== 'object') throw new Error(`${block.name}: no tolerance for ${key}`);
  let difference = Math.abs((got as number) - want);
  if (tolerance.modulo !== undefined) {
    difference %= tolerance.modulo;
    difference = Math.min(difference, tolerance.modulo - difference);
  }
  const allowed = (tolerance.abs ?? 0) + (tolerance.rel ?? 0) * Math.abs(want);
  expect(difference <= allowed, `${label}: got ${String(got)}, want ${want}, allowed ${allowed}`).toBe(true);
}

/** Computes the outputs of one case: same keys as the table's `out`. */
export type CheckRunner = (input: Record<string, CheckValue>) => Record<string, unknown>;

/**
 * Runs every case and every output key of a check table, and fails when a block has no runner.
 * @param runners by block name; `null` for a block that another test holds
 */
export function describeCheckTable(file: string, runners: Readonly<Record<string, CheckRunner | null>>): void {
  describe.skipIf(!sharedIsHere)(`check table ${file}`, () => {
    const blocks = sharedIsHere ? (readSharedJson(`checks/${file}.json`) as { blocks: CheckBlock[] }).blocks : [];
    it('has a runner for every block', () => {
      expect(Object.keys(runners).sort()).toEqual(blocks.map((block) => block.name).sort());
    });
    for (const block of blocks) {
      const run = runners[block.name];
      if (run === undefined || run === null) continue;
      it.each(block.cases.map((entry): [string, CheckCase] => [entry.id, entry]))('%s', (id, entry) => {
        const got = run(entry.in);
        for (const [key, want] of Object.entries(entry.out)) expectAgrees(block, key, got[key], want, `${id} ${key}`);
      });
    }
  });
}

/** A number out of a check table's input: null becomes NaN. */
export function numberOf(value: CheckValue | undefined): number {
  return typeof value === 'number' ? value : NaN;
}

/** A list out of a check table's input: null becomes NaN. */
export function numbersOf(value: CheckValue | undefined): number[] {
  return Array.isArray(value) ? value.map(numberOf) : [];
}
