// Every shipped rule on the cases that it names: it fires on the ones, and is silent on the others.

import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { checkCase } from '../../src/check.ts';
import { shippedRules } from '../../src/cli/shippedRules.ts';
import { readCase } from '../../src/model/caseFile.ts';
import { applyRules } from '../../src/rules/evaluate.ts';
import type { Analyses } from '../../src/rules/facts.ts';
import { loadRules } from '../../src/rules/load.ts';

const folder = new URL('../../cases/', import.meta.url);
const rules = loadRules([shippedRules()]);
const known = new Map<string, Analyses>();

function analysesOf(id: string): Analyses {
  const old = known.get(id);
  if (old) return old;
  const fresh = checkCase(readCase(readFileSync(new URL(`${id}.yaml`, folder)), `${id}.yaml`), []).analyses;
  known.set(id, fresh);
  return fresh;
}

describe('shipped rules', () => {
  it('are more than twelve, and each has a way to mend and a source', () => {
    expect(rules.length).toBeGreaterThan(12);
    for (const rule of rules) expect(rule.mend.length > 10 && rule.source.length > 0, rule.id).toBe(true);
  });

  for (const rule of rules) {
    for (const id of rule.examples.fires)
      it(`${rule.id} fires on ${id}`, () => {
        expect(applyRules([rule], analysesOf(id)).map((f) => f.rule)).toEqual([rule.id]);
      });
    for (const id of rule.examples.silent)
      it(`${rule.id} is silent on ${id}`, () => {
        expect(applyRules([rule], analysesOf(id))).toEqual([]);
      });
  }
});
