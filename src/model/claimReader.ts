// Claims: one statement each, with what that statement needs. What a profile means is worked out by the analyses; that its
// functions and coordinates exist is checked here.

import { readTree } from '../notation/parse.ts';
import { shortened } from '../notation/part.ts';
import { NotationError } from '../notation/source.ts';
import { FUNCTION_NAMES, type Tree } from '../notation/tree.ts';
import { type CaseText, isYes } from './caseText.ts';
import type { Claim, ProfileText } from './claim.ts';
import { readQuotient } from './constants.ts';
import { type Declarations, fieldNamed } from './declarations.ts';
import { spaceAxes } from './geometry.ts';
import { didYouMean, type Names } from './names.ts';
import type { ClaimData } from './schema.ts';
import { subtrees } from './subtrees.ts';
import type { Path } from './yamlSource.ts';

/** Reads all claims. Throws InputError.
 *  @param dual names in dual values of the proposal's parameters; undefined without a proposal */
export function readClaims(
  claims: readonly ClaimData[],
  text: CaseText,
  declared: Declarations,
  dual: Names | undefined,
): Claim[] {
  const seen = new Set<string>();
  return claims.map((data, i) => {
    const path = ['claims', i];
    if (seen.has(data.id))
      text.fail(`a second claim has the id "${shortened(data.id)}"`, 'give every claim its own id', [
        ...path,
        'id',
      ]);
    seen.add(data.id);
    return new ClaimReader(path, text, declared, dual).read(data);
  });
}

/** Claims that no analysis of this version judges. */
type LaterClaim = Extract<
  ClaimData,
  | { winding: unknown }
  | { rotation: unknown }
  | { boost: unknown }
  | { dilatation: unknown }
  | { duality: unknown }
>;

class ClaimReader {
  constructor(
    private readonly path: Path,
    private readonly text: CaseText,
    private readonly declared: Declarations,
    private readonly dual: Names | undefined,
  ) {}

  read(data: ClaimData): Claim {
    const base = { id: data.id, position: this.text.source.positionOf(this.path) };
    if ('shift' in data) {
      const profile = this.profile(data.shift, 'shift', SHIFT_FUNCTIONS);
      return { ...base, kind: 'shift', profile, field: this.field(data.field), status: data.status };
    }
    if ('configuration' in data) return { ...base, ...this.configuration(data) };
    if ('point-group' in data) {
      const { order, name } = data['point-group'];
      if (order === undefined && name === undefined)
        this.fail('the claim names no point group', 'write e.g. point-group: {order: 8}', 'point-group');
      return { ...base, kind: 'point-group', order, name, status: data.status };
    }
    if ('corrections' in data)
      return { ...base, kind: 'corrections', begin: this.begin(data.corrections.begin) };
    if ('count' in data) {
      const path = [...this.path, 'count'];
      const formula = this.text.expression(data.count, path, (t) => this.countFormula(readTree(t)));
      return { ...base, kind: 'count', formula, text: data.count, group: data.group };
    }
    return { ...base, ...this.later(data) };
  }

  private fail(problem: string, mend: string, ...below: readonly (string | number)[]): never {
    return this.text.fail(problem, mend, [...this.path, ...below]);
  }

  private field(written: string | undefined): string {
    const { fields } = this.declared;
    const [only, another] = fields;
    if (written !== undefined)
      return fieldNamed(written, fields, this.text, [...this.path, 'field'], 'value');
    if (only && !another) return only.name;
    const names = fields.map((f) => f.name);
    return this.fail(
      'the claim does not say which field is meant',
      `add field: ${names.join(' or field: ')}`,
    );
  }

  private profile(written: string, key: string, functions: ReadonlySet<string>): ProfileText {
    const axes = this.declared.lattice.axes.map((x) => x.name);
    const tree = this.text.expression(written, [...this.path, key], (t) => {
      const read = readTree(t);
      for (const part of subtrees(read)) refuseInProfile(part, axes, functions, key);
      return read;
    });
    return { text: written, tree };
  }

  private configuration(data: Extract<ClaimData, { configuration: string }>) {
    const { suppressed, exponent, truncates } = data;
    const { continuum, lattice } = suppressed ?? {};
    if (continuum === undefined && lattice === undefined && exponent === undefined && truncates === undefined)
      this.fail(
        'the claim says nothing about the configuration',
        'add suppressed: {continuum: yes, lattice: yes}, exponent: {a: -1, l: 1} or truncates: no',
      );
    const power = (key: 'a' | 'l'): string =>
      this.text.exact(exponent![key], [...this.path, 'exponent', key]).toString();
    return {
      kind: 'configuration',
      profile: this.profile(data.configuration, 'configuration', PROFILE_FUNCTIONS),
      field: this.field(data.field),
      suppressed: {
        continuum: continuum === undefined ? undefined : isYes(continuum),
        lattice: lattice === undefined ? undefined : isYes(lattice),
      },
      exponent: exponent && { a: power('a'), l: power('l') },
      truncates: truncates === undefined ? undefined : isYes(truncates),
    } as const;
  }

  private begin(begin: number | Readonly<Record<string, number>>): number | Map<string, number> {
    if (typeof begin === 'number') return begin;
    const { limits } = this.declared.lattice;
    const out = new Map<string, number>();
    for (const [key, order] of Object.entries(begin)) {
      const path = [...this.path, 'corrections', 'begin', key];
      const spacing = this.text.name(key, path, 'key');
      if (!limits.includes(spacing))
        this.text.fail(`"${spacing}" is not a spacing`, `the spacings are ${limits.join(', ')}`, path, 'key');
      out.set(spacing, order);
    }
    if (out.size === 0)
      this.fail('no order is claimed', 'write e.g. begin: 2 or begin: {a: 2}', 'corrections', 'begin');
    return out;
  }

  private countFormula(tree: Tree): Tree {
    const { lattice } = this.declared;
    const sizes = spaceAxes(lattice).map((k) => `L${lattice.axes[k]!.name}`);
    const known = new Set(sizes.flatMap((s) => [s, s.replace('L', 'L_')]));
    for (const part of subtrees(tree)) {
      const refuse = (problem: string, mend: string): never => {
        throw new NotationError(problem, mend, part.span.start);
      };
      if (part.kind === 'symbol' && !known.has(part.name))
        refuse(
          `"${part.name}" is not a size`,
          didYouMean(part.name, sizes, `the sizes are ${sizes.join(', ')}`),
        );
      if (part.kind === 'call' && !COUNT_FUNCTIONS.includes(part.name))
        refuse(
          `"${part.name}" is not known in a count`,
          `use ${COUNT_FUNCTIONS.join(', ')}; for a product write *`,
        );
      if (part.kind === 'operator' || part.kind === 'apply')
        refuse('an operator stands in a count', 'write a formula in the sizes');
    }
    return tree;
  }

  /** Statements that are read and kept, for analyses to come. */
  private later(data: LaterClaim) {
    const { status } = data;
    const { lattice, fields } = this.declared;
    if ('winding' in data) {
      const field = fieldNamed(data.winding, fields, this.text, [...this.path, 'winding'], 'value');
      return { kind: 'winding', text: field, status } as const;
    }
    if ('rotation' in data)
      return { kind: 'rotation', text: this.plane(data.rotation, 'rotation'), status } as const;
    if ('boost' in data) return { kind: 'boost', text: this.plane(data.boost, 'boost'), status } as const;
    if ('dilatation' in data) {
      const weights = Object.entries(data.dilatation).map(([key, value]) => {
        const path = [...this.path, 'dilatation', key];
        const axis = this.text.name(key, path, 'key');
        if (!lattice.axes.some((x) => x.name === axis))
          this.text.fail(`"${axis}" is not an axis`, `the axes are ${this.axisNames}`, path, 'key');
        return `${axis}: ${this.text.exact(value, path)}`;
      });
      if (weights.length === 0)
        this.fail('no weight is claimed', 'write e.g. dilatation: {tau: 2, x: 1}', 'dilatation');
      return { kind: 'dilatation', text: weights.join(', '), status } as const;
    }
    return { kind: 'duality', text: this.duality(data.duality), status } as const;
  }

  private get axisNames(): string {
    return this.declared.lattice.axes.map((x) => x.name).join(', ');
  }

  /** Two axes: both of space for a rotation, one of time for a boost. */
  private plane(written: readonly string[], kind: 'rotation' | 'boost'): string {
    const { axes } = this.declared.lattice;
    const chosen = written.map((w, i) => {
      const path = [...this.path, kind, i];
      const name = this.text.name(w, path, 'value');
      return (
        axes.find((x) => x.name === name) ??
        this.text.fail(`"${name}" is not an axis`, `the axes are ${this.axisNames}`, path)
      );
    });
    if (chosen[0] === chosen[1])
      this.fail(`a ${kind} needs two different axes`, `choose from ${this.axisNames}`, kind);
    const times = chosen.filter((x) => x.role === 'time').length;
    if (times !== (kind === 'boost' ? 1 : 0))
      this.fail(
        kind === 'boost'
          ? 'a boost mixes the time axis with one of space'
          : 'a rotation mixes two axes of space',
        kind === 'boost'
          ? 'name the axis with role: time and another'
          : 'name two axes of space, or write boost',
        kind,
      );
    return chosen.map((x) => x.name).join(', ');
  }

  private duality(data: Readonly<Record<string, string>>): string {
    const { dual } = this;
    if (!dual)
      return this.text.fail(
        'a duality is claimed without a proposal',
        'add a proposal with its parameters, or leave the claim out',
        [...this.path, 'duality'],
        'key',
      );
    const known = this.declared.proposalParameters.map((p) => p.name);
    const texts = Object.entries(data).map(([key, value]) => {
      const path = [...this.path, 'duality', key];
      const name = this.text.name(key, path, 'key');
      if (!known.includes(name))
        this.text.fail(
          `"${name}" is not a parameter of the proposal`,
          didYouMean(name, known, `these are ${known.join(', ') || 'none'}`),
          path,
          'key',
        );
      this.text.expression(value, path, (t) => readQuotient(readTree(t), dual));
      return `${name} -> ${value}`;
    });
    if (texts.length === 0)
      this.fail('no parameter is mapped', 'write e.g. duality: {mu: "1/(4*pi^2*mu)"}', 'duality');
    return texts.join(', ');
  }
}

/** Integer functions of count formulas. */
const COUNT_FUNCTIONS: readonly string[] = ['gcd', 'min', 'max'];

/** Functions that a profile may hold: free, smooth, step, one site, and those of the notation. */
const PROFILE_FUNCTIONS: ReadonlySet<string> = new Set([
  ...['f', 'g', 'h', 's', 'u', 'theta', 'delta_site'],
  ...FUNCTION_NAMES,
]);
/** Those of them that a shift symmetry may have as its parameter. */
const SHIFT_FUNCTIONS: ReadonlySet<string> = new Set(['f', 'g', 'h', 's', 'u', 'cos', 'sin', 'sqrt']);

function refuseInProfile(
  part: Tree,
  axes: readonly string[],
  functions: ReadonlySet<string>,
  key: string,
): void {
  const refuse = (problem: string, mend: string): never => {
    throw new NotationError(problem, mend, part.span.start);
  };
  switch (part.kind) {
    case 'symbol':
      if (part.name !== 'pi' && !axes.includes(part.name))
        refuse(
          `"${part.name}" is not a coordinate`,
          didYouMean(part.name, axes, `the coordinates are ${axes.join(', ')}`),
        );
      return;
    case 'call':
      if (!functions.has(part.name))
        refuse(
          axes.includes(part.name)
            ? `"${part.name}(…)" reads as a function called ${part.name}`
            : `"${part.name}(…)" is not known in a ${key}`,
          axes.includes(part.name)
            ? `for a product write ${part.name}*(…)`
            : `use ${[...functions].join(', ')}`,
        );
      return;
    case 'quotient':
      if (part.denominator.kind === 'number' && part.denominator.value.isZero)
        refuse('the denominator is zero', 'divide by something else');
      return;
    case 'operator':
    case 'apply':
      refuse(`an operator stands in a ${key}`, 'write functions of the coordinates');
  }
}
