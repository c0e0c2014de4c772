// From a case file to a case: the shape (schema.ts), then the meaning of every name and string, with positions for all that
// is wrong. Nothing in a file is ever evaluated as code.

import type { Quotient } from '../exact/quotient.ts';
import { Rational } from '../exact/rational.ts';
import { readTree } from '../notation/parse.ts';
import { InputError, NotationError } from '../notation/source.ts';
import type { Tree } from '../notation/tree.ts';
import type { ActionTerm, Expression } from './action.ts';
import type { Case, ExpandSettings, Proposal } from './case.ts';
import { readClaims } from './claimReader.ts';
import type { Axis, Field, FieldValues, Lattice, Parameter } from './geometry.ts';
import { MOST_AXES, MOST_FIELDS, MOST_PARAMETERS } from './limits.ts';
import { readExpression, readQuotient } from './meaning.ts';
import type { Names } from './names.ts';
import { type CaseData, caseSchema, STATEMENTS } from './schema.ts';
import { shapeError } from './validate.ts';
import { type Path, YamlSource } from './yamlSource.ts';

/** Reads one case. Throws InputError with file, line and column for anything wrong. */
export function readCase(input: string | Uint8Array, file: string): Case {
  return new CaseReader(YamlSource.read(input, file)).read();
}

const KNOWN_KEYS = [
  ...[
    'case',
    'title',
    'lattice',
    'axes',
    'vectors',
    'spacing',
    'role',
    'fields',
    'values',
    'at',
    'parameters',
    'positive',
  ],
  ...[
    'parent',
    'action',
    'hamiltonian',
    'compactness',
    'name',
    'term',
    'proposal',
    'lagrangian',
    'matching',
    'rescaling',
  ],
  ...[
    'limits',
    'expand',
    'beyond-leading',
    'background',
    'claims',
    'id',
    'field',
    'status',
    'suppressed',
    'exponent',
  ],
  ...['truncates', 'group', 'order', 'continuum', 'begin', ...STATEMENTS],
];

/** Names with a meaning of their own in the notation. */
const RESERVED = new Set([
  'pi',
  'T',
  'd',
  'Delta',
  'Deltab',
  'Deltac',
  'cos',
  'sin',
  'tan',
  'exp',
  'log',
  'sqrt',
  'cosh',
  'sinh',
]);

/** What the readers of strings need: the source and the names. Also used for claims. */
export class CaseReader {
  private readonly data: CaseData;
  private readonly warnings: { text: string; position: ReturnType<YamlSource['positionOf']> }[] = [];
  private readonly used = new Map<string, string>();

  constructor(readonly source: YamlSource) {
    const plain = source.toPlain();
    const parsed = caseSchema.safeParse(plain);
    if (!parsed.success) throw shapeError(parsed.error, source, KNOWN_KEYS);
    this.data = parsed.data;
  }

  read(): Case {
    const { data, source } = this;
    this.refuseLater();
    const axes = this.axes();
    const fields = this.fields(axes);
    const parameters = this.parameters(data.parameters, ['parameters'], 'parameter');
    const lattice: Lattice = { axes, limits: this.limits(axes) };
    const proposalParameters = this.parameters(
      data.proposal?.parameters,
      ['proposal', 'parameters'],
      'parameter of the proposal',
    );
    const names = this.names(lattice, fields, parameters, proposalParameters);
    const terms = this.terms(names.parent, fields);
    return {
      id: data.case,
      title: data.title ?? data.case,
      file: source.file,
      source: source.text,
      lattice,
      fields,
      parameters,
      parent: { terms, compactness: data.parent.compactness ?? 'cosine' },
      proposal: data.proposal && this.proposal(names, proposalParameters),
      expand: this.expand(fields),
      claims: readClaims(data.claims ?? [], this, lattice, fields),
      warnings: this.warnings,
    };
  }

  fail(problem: string, mend: string, path: Path, key = false): never {
    throw new InputError(problem, mend, key ? this.source.positionOfKey(path) : this.source.positionOf(path));
  }

  /** Reads the string at a path and gives its errors a place in the file. */
  inString<T>(path: Path, text: string, read: (text: string) => T): T {
    if (this.source.isPlain(path) && (/[&*]/.test(text) || this.source.commentBehind(path) !== ''))
      this.warnings.push({
        text: `this string is not in quotes, and YAML reads ${this.source.commentBehind(path) !== '' ? 'what follows # as a comment' : '& and * in its own way'}; put it in quotes`,
        position: this.source.positionOf(path),
      });
    try {
      return read(text);
    } catch (error) {
      if (!(error instanceof NotationError)) throw error;
      throw new InputError(error.problem, error.mend, this.source.positionInString(path, error.offset));
    }
  }

  /** Exact number at a path. */
  exact(value: string | number, path: Path): Rational {
    try {
      return Rational.parse(String(value));
    } catch {
      return this.fail(
        `"${value}" is not an exact number`,
        'write p, p/q or a decimal, in quotes if it is a quotient',
        path,
      );
    }
  }

  /** ASCII spelling of a declared name; refuses clashes and reserved names. */
  private declare(name: string, what: string, path: Path): string {
    const tree = this.nameTree(name, path);
    const clash = this.used.get(tree);
    if (clash !== undefined)
      this.fail(`"${tree}" is already the name of a ${clash}`, 'rename one of them', path, true);
    this.used.set(tree, what);
    return tree;
  }

  private nameTree(name: string, path: Path): string {
    let tree: Tree | undefined;
    try {
      tree = readTree(name);
    } catch (error) {
      if (!(error instanceof NotationError)) throw error;
    }
    if (tree?.kind !== 'symbol' || name.length > 40)
      return this.fail(
        `"${name.slice(0, 40)}" cannot be a name`,
        'use a letter followed by letters, digits and _',
        path,
        true,
      );
    if (RESERVED.has(tree.name))
      return this.fail(
        `"${tree.name}" has a meaning of its own in the notation`,
        'choose another name',
        path,
        true,
      );
    return tree.name;
  }

  private refuseLater(): void {
    const { parent, lattice } = this.data;
    const handles = 'this version checks actions on orthogonal lattices with cosines or polynomials';
    if (parent.hamiltonian)
      this.fail(
        'a Hamiltonian parent is not handled',
        `${handles}; write the action`,
        ['parent', 'hamiltonian'],
        true,
      );
    if (!parent.action)
      this.fail('"action" is missing', 'list the terms of the lattice action under parent: action', [
        'parent',
      ]);
    if (lattice.vectors)
      this.fail(
        'lattice vectors are not handled',
        `${handles}; leave vectors out`,
        ['lattice', 'vectors'],
        true,
      );
    if (parent.compactness && parent.compactness !== 'cosine')
      this.fail(`compactness ${parent.compactness} is not handled`, `${handles}; write cosine`, [
        'parent',
        'compactness',
      ]);
  }

  private axes(): Axis[] {
    const entries = Object.entries(this.data.lattice.axes);
    const path = ['lattice', 'axes'];
    if (entries.length === 0) this.fail('there is no axis', 'name at least one, e.g. x: {spacing: a}', path);
    if (entries.length > MOST_AXES)
      this.fail(`there are ${entries.length} axes`, `at most ${MOST_AXES} are handled`, path);
    const axes = entries.map(
      ([name, { spacing, role }]): Axis => ({
        name: this.declare(name, 'axis', [...path, name]),
        spacing: this.nameTree(spacing, [...path, name, 'spacing']),
        role: role ?? 'space',
      }),
    );
    const times = axes.filter((x) => x.role === 'time');
    if (times.length > 1)
      this.fail('there are two time axes', 'keep role: time on one', [...path, times[1]!.name]);
    for (const [i, { spacing }] of axes.entries())
      if (this.used.get(spacing) === undefined) this.used.set(spacing, 'lattice spacing');
      else if (this.used.get(spacing) !== 'lattice spacing')
        this.fail(
          `"${spacing}" is already the name of an ${this.used.get(spacing)}`,
          'choose another symbol for the spacing',
          [...path, entries[i]![0], 'spacing'],
        );
    return axes;
  }

  private limits(axes: readonly Axis[]): string[] {
    const times = axes.filter((x) => x.role === 'time');
    const all = [...new Set([...times, ...axes].map((x) => x.spacing))];
    const given = this.data.limits?.map((s, i) => {
      const name = this.nameTree(s, ['limits', i]);
      if (!all.includes(name))
        this.fail(`"${s}" is not a spacing`, `the spacings are ${all.join(', ')}`, ['limits', i]);
      return name;
    });
    if (given && (new Set(given).size !== all.length || given.length !== all.length))
      this.fail('the limits must list every spacing once', `write [${all.join(', ')}] in your order`, [
        'limits',
      ]);
    return given ?? all;
  }

  private fields(axes: readonly Axis[]): Field[] {
    const entries = Object.entries(this.data.fields);
    if (entries.length === 0)
      this.fail('there is no field', 'declare one, e.g. phi: {values: angle}', ['fields']);
    if (entries.length > MOST_FIELDS)
      this.fail(`there are ${entries.length} fields`, `at most ${MOST_FIELDS} are handled`, ['fields']);
    return entries.map(([name, { values, at }]): Field => {
      const path = ['fields', name];
      const offsets = at?.map((v, i) => this.exact(v, [...path, 'at', i])) ?? axes.map(() => Rational.zero);
      if (offsets.length !== axes.length)
        this.fail(`"at" has ${offsets.length} entries`, `give one for each of the ${axes.length} axes`, [
          ...path,
          'at',
        ]);
      if (offsets.some((v) => !v.isZero))
        this.fail(
          'fields off the sites are not handled',
          'this version handles fields on sites; leave "at" out',
          [...path, 'at'],
          true,
        );
      return { name: this.declare(name, 'field', path), values: this.fieldValues(values, path), at: offsets };
    });
  }

  private fieldValues(values: string, path: Path): FieldValues {
    if (values === 'angle' || values === 'real') return { kind: values };
    const where = [...path, 'values'];
    if (values === 'integer' || /^residue \d+$/.test(values))
      return this.fail(
        `fields with values "${values}" are not handled`,
        'this version handles angle and real',
        where,
      );
    return this.fail(`"${values.slice(0, 40)}" is no kind of values`, 'write angle or real', where);
  }

  private parameters(data: CaseData['parameters'], path: readonly string[], what: string): Parameter[] {
    const entries = Object.entries(data ?? {});
    if (entries.length > MOST_PARAMETERS)
      this.fail(`there are ${entries.length} parameters`, `at most ${MOST_PARAMETERS} are handled`, path);
    return entries.map(([name, value]) => ({
      name: this.declare(name, what, [...path, name]),
      positive: value?.positive ?? false,
    }));
  }

  private names(
    lattice: Lattice,
    fields: readonly Field[],
    parent: readonly Parameter[],
    proposal: readonly Parameter[],
  ) {
    const axes = lattice.axes.map((x) => x.name);
    const fieldNames = fields.map((f) => f.name);
    const parentNames = parent.map((p) => p.name);
    const proposalNames = proposal.map((p) => p.name);
    const common = { axes, fields: fieldNames };
    const inProposal = new Map(proposalNames.map((n) => [n, 'is a parameter of the proposal']));
    const inParent = new Map(
      parentNames.map((n) => [n, 'is a parameter of the parent, not of the proposal']),
    );
    return {
      parent: {
        ...common,
        constants: new Set([...parentNames, ...lattice.limits]),
        elsewhere: inProposal,
        kind: 'lattice',
      },
      proposal: {
        ...common,
        constants: new Set([...proposalNames, ...lattice.limits]),
        elsewhere: inParent,
        kind: 'continuum',
      },
    } satisfies Record<string, Names>;
  }

  private terms(names: Names, fields: readonly Field[]): ActionTerm[] {
    const seen = new Set<string>();
    return this.data.parent.action!.map(({ name, term }, i): ActionTerm => {
      const path = ['parent', 'action', i];
      if (seen.has(name))
        this.fail(`a second term is called "${name.slice(0, 40)}"`, 'give every term its own name', [
          ...path,
          'name',
        ]);
      seen.add(name);
      const expression = this.inString([...path, 'term'], term, (text) =>
        readExpression(readTree(text), names),
      );
      if (expression.kind === 'constant')
        this.fail('this term holds no field', 'leave constants out of the action', [...path, 'term']);
      this.warnAboutPeriod(expression, fields, [...path, 'term']);
      return { name, expression, text: term, position: this.source.positionOf([...path, 'term']) };
    });
  }

  /** Functions of period 2π need integer weights on angle fields. */
  private warnAboutPeriod(expression: Expression, fields: readonly Field[], path: Path): void {
    const angles = new Set(fields.filter((f) => f.values.kind === 'angle').map((f) => f.name));
    const visit = (e: Expression, isPeriodic: boolean): void => {
      switch (e.kind) {
        case 'constant':
          return;
        case 'linear':
          for (const [name, stencil] of e.form)
            if (isPeriodic && angles.has(name) && !stencil.terms.every((t) => t.weight.asRational?.isInteger))
              this.warnings.push({
                text: `${name} is an angle, but this argument is not invariant under ${name} -> ${name} + 2 pi on one site: its weights are no integers`,
                position: this.source.positionOf(path),
              });
          return;
        case 'sum':
          for (const t of e.terms) visit(t, isPeriodic);
          return;
        case 'product':
          for (const f of e.factors) visit(f, isPeriodic);
          return;
        case 'power':
          visit(e.base, isPeriodic);
          return;
        case 'function':
          visit(e.argument, e.name === 'cos' || e.name === 'sin' || e.name === 'tan');
      }
    };
    visit(expression, false);
  }

  private proposal(names: { parent: Names; proposal: Names }, parameters: readonly Parameter[]): Proposal {
    const data = this.data.proposal!;
    const path = ['proposal', 'lagrangian'];
    const lagrangian = this.inString(path, data.lagrangian, (text) =>
      readExpression(readTree(text), names.proposal),
    );
    if (lagrangian.kind === 'constant')
      this.fail('this Lagrangian holds no field', 'write the continuum Lagrangian', path);
    const known = parameters.map((p) => p.name);
    const matching =
      data.matching &&
      this.quotients(
        data.matching,
        ['proposal', 'matching'],
        known,
        names.parent,
        'parameter of the proposal',
      );
    const rescaling = this.quotients(
      data.rescaling ?? {},
      ['proposal', 'rescaling'],
      names.parent.fields,
      names.parent,
      'field',
    );
    return {
      parameters,
      lagrangian,
      text: data.lagrangian,
      position: this.source.positionOf(path),
      matching,
      rescaling,
    };
  }

  private quotients(
    data: Readonly<Record<string, string>>,
    path: readonly string[],
    known: readonly string[],
    names: Names,
    what: string,
  ): Map<string, Quotient> {
    return new Map(
      Object.entries(data).map(([key, text]) => {
        const name = this.nameTree(key, [...path, key]);
        if (!known.includes(name))
          this.fail(
            `"${key}" is no ${what}`,
            `these are ${known.join(', ') || 'none'}`,
            [...path, key],
            true,
          );
        return [name, this.inString([...path, key], text, (t) => readQuotient(readTree(t), names))];
      }),
    );
  }

  private expand(fields: readonly Field[]): ExpandSettings {
    const data = this.data.expand;
    const background = Object.entries(data?.background ?? {}).map(([key, value]): [string, Rational] => {
      const path = ['expand', 'background', key];
      const name = this.nameTree(key, path);
      if (!fields.some((f) => f.name === name))
        this.fail(
          `"${key}" is no field`,
          `the fields are ${fields.map((f) => f.name).join(', ')}`,
          path,
          true,
        );
      return [name, this.exact(value, path)];
    });
    return {
      beyondLeading: data?.['beyond-leading'] ?? 4,
      fields: data?.fields,
      background: new Map(background),
    };
  }
}
