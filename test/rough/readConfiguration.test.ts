import { describe, expect, it } from 'vitest';
import { Rational } from '../../src/exact/rational.ts';
import type { Field, Lattice } from '../../src/model/geometry.ts';
import { readTree } from '../../src/notation/parse.ts';
import { NotationError } from '../../src/notation/source.ts';
import type { Profile } from '../../src/rough/profile.ts';
import { readConfiguration } from '../../src/rough/readConfiguration.ts';

const lattice: Lattice = {
  axes: [
    { name: 'tau', spacing: 'b', role: 'time' },
    { name: 'x', spacing: 'a', role: 'space' },
    { name: 'y', spacing: 'a', role: 'space' },
  ],
  limits: ['b', 'a'],
};
const none = [Rational.zero, Rational.zero, Rational.zero];
const fields: Field[] = [{ name: 'phi', values: { kind: 'angle' }, at: none }];
const read = (text: string): Profile => readConfiguration(readTree(text), lattice, fields, 'phi', text);

describe('reading a family', () => {
  it('takes oblique arguments as rows over all axes', () => {
    expect(read('f(x-2*y, tau)').terms[0]!.factors).toEqual([
      {
        kind: 'free',
        name: 'f',
        rows: [
          [0, 1, -2],
          [1, 0, 0],
        ],
      },
    ]);
  });
  it('makes the row of a step primitive', () => {
    expect(read('theta(2*x + 2*y)').terms[0]!.factors).toEqual([{ kind: 'step', row: [0, 1, 1] }]);
  });
  it('takes a step and a single site for their own squares, whatever the order of factors', () => {
    expect(read('theta(x) theta(y) theta(x)').terms[0]!.factors).toEqual(
      read('theta(y) theta(x)').terms[0]!.factors,
    );
    expect(read('delta_site(x)^3').terms[0]!.factors).toHaveLength(1);
  });
  it('gives independent heights to different terms and one height to a polynomial', () => {
    expect(read('theta(x) + theta(y)').terms.map((t) => t.height)).toEqual(['1', '2']);
    expect(read('x^2 - y^2').terms).toHaveLength(1);
    expect(read('x^2 - y^2').terms[0]!.polynomial).toHaveLength(2);
    expect(read('f(x)').terms[0]!.height).toBeUndefined();
  });
  it('drops terms that cancel', () => {
    expect(read('f(x) - f(x)').terms).toEqual([]);
  });
  it('takes a multiple of pi for an exact height, and its free function for an integer', () => {
    expect(read('2*pi theta(x)').terms[0]!.height).toBeUndefined();
    expect(read('2*pi f(x)').terms[0]!.factors[0]).toMatchObject({ isInteger: true });
  });
  it('absorbs a sign into a free function of the same argument', () => {
    const [term] = read('(-1)^(x+y) f(x+y)').terms;
    expect(term!.phase.every((p) => p.isZero)).toBe(true);
    expect(read('(-1)^x f(y)').terms[0]!.phase.map(String)).toEqual(['0', '1/2', '0']);
  });
  const wrong: [string, RegExp][] = [
    ['w(x)', /not a profile/],
    ['q', /not a coordinate/],
    ['theta(x, y)', /one argument/],
    ['f(x + 1)', /integer combination/],
    ['f(x y)', /integer combination/],
    ['f(0)', /integer combination/],
    ['x^(1/2)', /natural number/],
    ['1/f(x)', /not a number/],
    ['Delta_x f(x)', /operator/],
    ['(-1)^(x/2)', /integer combination/],
  ];
  for (const [text, message] of wrong)
    it(`refuses ${text}`, () => {
      expect(() => read(text)).toThrow(NotationError);
      expect(() => read(text)).toThrow(message);
    });
});
