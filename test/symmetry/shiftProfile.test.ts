import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Coefficient } from '../../src/exact/coefficient.ts';
import { Rational, rational } from '../../src/exact/rational.ts';
import { readTree } from '../../src/notation/parse.ts';
import { NotationError } from '../../src/notation/source.ts';
import type { ShiftFamily } from '../../src/symmetry/family.ts';
import { profileText, readShiftProfile } from '../../src/symmetry/shiftProfile.ts';
import { fieldsOf, latticeOf } from './systems.ts';

const lattice = latticeOf('tau', 'x', 'y');
const angle = fieldsOf(lattice, 'angle', 'phi');
const read = (text: string): ShiftFamily[] => readShiftProfile(readTree(text), lattice, angle, 'phi');

describe('reading a shift profile', () => {
  it('takes a sum of functions apart into families', () => {
    const families = read('f(x) + (-1)^x g(y) + x f(y)');
    expect(families.map((f) => f.free)).toEqual([[[0, 1, 0]], [[0, 0, 1]], [[0, 0, 1]]]);
    expect(families[1]!.phase.map(String)).toEqual(['0', '1/2', '0']);
    expect(families[2]!.prefactor[0]).toEqual([{ exponents: [0, 1, 0], weight: Coefficient.one }]);
    expect(families.map((f) => f.profile)).toEqual(['f(x)', '(-1)^x g(y)', 'x f(y)']);
  });

  it('keeps a polynomial together as one shift', () => {
    const [family, ...more] = read('x^2 - y^2');
    expect(more).toEqual([]);
    expect(family!.prefactor[0]!.map((t) => [t.exponents, `${t.weight.asRational}`])).toEqual([
      [[0, 0, 2], '-1'],
      [[0, 2, 0], '1'],
    ]);
    expect(read('(x + y)^2')[0]!.profile).toBe('x^2 + 2*x*y + y^2');
  });

  it('reads arguments that are several or oblique', () => {
    expect(read('f(x, tau)')[0]!.free).toEqual([
      [0, 1, 0],
      [1, 0, 0],
    ]);
    expect(read('f(x-2*y)')[0]!.free).toEqual([[0, 1, -2]]);
    expect(read('s(x) u(y)'.replace(' u(y)', ''))[0]!.free).toEqual([[0, 1, 0]]);
  });

  it('reads multiples of pi on an angle as discrete shifts and plain numbers as continuous ones', () => {
    expect(read('pi').map((f) => [f.discrete, f.profile])).toEqual([[2, 'pi']]);
    expect(read('2*pi/3').map((f) => [f.discrete, f.profile])).toEqual([[3, '2*pi/3']]);
    expect(read('pi f(x)').map((f) => [f.discrete, f.profile])).toEqual([[2, 'pi*f(x)']]);
    expect(read('1').map((f) => [f.discrete, f.profile])).toEqual([[undefined, '1']]);
    const real = fieldsOf(lattice, 'real', 'phi');
    expect(readShiftProfile(readTree('pi'), lattice, real, 'phi')[0]!.discrete).toBeUndefined();
  });

  it('reads waves', () => {
    expect(read('cos(2*pi*x/3)')[0]!.phase.map(String)).toEqual(['0', '1/3', '0']);
    expect(read('sin(pi*x/2 + pi*y/2) f(tau)')[0]!.phase.map(String)).toEqual(['0', '1/4', '1/4']);
  });

  it.each<[string, number, string]>([
    ['f(x) + z', 7, 'not a coordinate'],
    ['f(x) g(y)', 0, 'product of two free functions'],
    ['f(x^2)', 2, 'not a linear function'],
    ['f(x/2)', 2, 'integer combination'],
    ['f(x+1)', 2, 'integer combination'],
    ['f(3)', 2, 'integer combination'],
    ['(-1)^(x/2)', 6, 'not an integer'],
    ['1/x', 2, 'not a number'],
    ['exp(x)', 0, 'not a shift'],
    ['cos(x)', 4, 'multiples of pi'],
    ['x^(1/2)', 3, 'natural number'],
    ['Delta_x phi', 0, 'operator'],
  ])('refuses %s at offset %i', (text, offset, problem) => {
    const attempt = (): unknown => read(text);
    expect(attempt).toThrow(NotationError);
    try {
      attempt();
    } catch (error) {
      expect((error as NotationError).offset).toBe(offset);
      expect((error as NotationError).problem).toContain(problem);
      expect((error as NotationError).mend).not.toBe('');
    }
  });

  it('names the fields when the claim is about none of them', () => {
    expect(() => readShiftProfile(readTree('f(x)'), lattice, angle, 'chi')).toThrow(/phi/);
  });
});

describe('printing a shift profile', () => {
  const weights = fc
    .tuple(
      fc.integer({ min: -4, max: 4 }).filter((n) => n !== 0),
      fc.integer({ min: 1, max: 3 }),
    )
    .map(([n, d]) => rational(n, d));
  const polynomials = fc.uniqueArray(
    fc.tuple(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 0, max: 3 }), weights),
    { minLength: 1, maxLength: 3, selector: ([x, y]) => `${x},${y}` },
  );
  const phases = fc.constantFrom<[number, number]>([0, 1], [1, 2], [1, 3], [2, 3], [1, 4], [1, 6], [5, 6]);
  const functionals = fc.constantFrom<number[][]>(
    [],
    [[0, 1, 0]],
    [[0, 1, -1]],
    [
      [1, 0, 0],
      [0, 1, 2],
    ],
  );

  it('reads back to the same family', () => {
    fc.assert(
      fc.property(polynomials, phases, phases, functionals, fc.boolean(), (p, a, b, free, isDiscrete) => {
        const terms = p
          .map(([x, y, w]) => ({
            exponents: [0, x, y],
            weight: Coefficient.rational(isDiscrete ? Rational.of(w.num) : w),
          }))
          .sort((s, t) => s.exponents[1]! - t.exponents[1]! || s.exponents[2]! - t.exponents[2]!);
        // 2π/5 times integers prime to 5, so that 5 is the order that is read
        const family: ShiftFamily = {
          prefactor: [terms],
          fields: ['phi'],
          phase: [Rational.zero, rational(...a), rational(...b)],
          free,
          discrete: isDiscrete ? 5 : undefined,
          profile: '',
        };
        const text = profileText(family, lattice, 'g');
        const [again, ...more] = read(text);
        expect(more).toEqual([]);
        const isWave = [...a, ...b].some((n) => n > 2);
        const conjugate = family.phase.map((x) => (x.isZero ? x : Rational.one.sub(x)));
        expect([family.phase, ...(isWave ? [conjugate] : [])]).toContainEqual(again!.phase);
        expect({ ...again, phase: family.phase, profile: '' }).toEqual(family);
      }),
      { numRuns: 200 },
    );
  });

  it('names the fields when several are shifted', () => {
    const family: ShiftFamily = {
      prefactor: [
        [{ exponents: [0, 0, 0], weight: Coefficient.one }],
        [{ exponents: [0, 1, 0], weight: Coefficient.integer(-1) }],
      ],
      fields: ['phi', 'chi'],
      phase: [Rational.zero, Rational.zero, Rational.zero],
      free: [[0, 0, 1]],
      discrete: undefined,
      profile: '',
    };
    expect(profileText(family, lattice)).toBe('phi: f(y); chi: -x f(y)');
  });
});
