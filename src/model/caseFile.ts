// From a case file to a case: the shape (schema.ts), then the meaning of every name and string, with positions for all that
// is wrong. Nothing in a file is ever evaluated as code.

import type { Quotient } from '../exact/quotient.ts';
import { readTree } from '../notation/parse.ts';
import { shortened } from '../notation/part.ts';
import type { Tree } from '../notation/tree.ts';
import type { ActionTerm, Expression } from './action.ts';
import type { Case, Proposal } from './case.ts';
import { CaseText } from './caseText.ts';
import { readClaims } from './claimReader.ts';
import { readQuotient } from './constants.ts';
import { type Declarations, readDeclarations } from './declarations.ts';
import { readContinuumExpression, readLatticeExpression } from './meaning.ts';

import { aperiodicArguments } from './periodicity.ts';
import { type CaseData, caseSchema } from './schema.ts';
import { type Scopes, scopes } from './scopes.ts';
import { subtrees } from './subtrees.ts';
import { shapeError } from './validate.ts';
import { type Path, YamlSource } from './yamlSource.ts';

/** Reads one case. Throws InputError with file, line and column for anything wrong.
 *  @param input the text of the file or its bytes
 *  @param file its name in messages; `-` for standard input */
export function readCase(input: string | Uint8Array, file: string): Case {
  const source = YamlSource.read(input, file);
  const parsed = caseSchema.safeParse(source.toPlain());
  if (!parsed.success) throw shapeError(parsed.error, source);
  return new CaseReader(parsed.data, new CaseText(source)).read();
}

class CaseReader {
  private readonly declared: Declarations;
  private readonly names: Scopes;

  constructor(
    private readonly data: CaseData,
    private readonly text: CaseText,
  ) {
    refuseUnhandled(data, text);
    this.declared = readDeclarations(data, text);
    this.names = scopes(this.declared);
  }

  read(): Case {
    const { data, text, declared } = this;
    const { lattice, fields, parameters, expand } = declared;
    const terms = this.terms();
    const proposal = data.proposal && this.proposal(data.proposal);
    const claims = readClaims(data.claims ?? [], text, declared, proposal && this.names.duality);
    return {
      id: data.case,
      title: data.title ?? data.case,
      file: text.source.file,
      source: text.source.text,
      lattice,
      fields,
      parameters,
      parent: { terms, compactness: data.parent.compactness ?? 'cosine' },
      proposal,
      expand,
      claims,
      warnings: text.warnings,
    };
  }

  private terms(): ActionTerm[] {
    const seen = new Set<string>();
    return this.data.parent.action!.map(({ name, term }, i): ActionTerm => {
      const path = ['parent', 'action', i];
      if (seen.has(name))
        this.text.fail(`a second term has the name "${shortened(name)}"`, 'give every term its own name', [
          ...path,
          'name',
        ]);
      seen.add(name);
      const expression = this.expression(term, [...path, 'term'], 'lattice');
      return { name, expression, text: term, position: this.text.source.positionOf([...path, 'term']) };
    });
  }

  private proposal(data: NonNullable<CaseData['proposal']>): Proposal {
    const path = ['proposal', 'lagrangian'];
    const { proposalParameters: parameters, fields } = this.declared;
    const parameterNames = parameters.map((p) => p.name);
    const fieldNames = fields.map((f) => f.name);
    return {
      parameters,
      lagrangian: this.expression(data.lagrangian, path, 'continuum'),
      text: data.lagrangian,
      position: this.text.source.positionOf(path),
      matching:
        data.matching &&
        this.quotients(data.matching, 'matching', parameterNames, 'a parameter of the proposal'),
      rescaling: this.quotients(data.rescaling ?? {}, 'rescaling', fieldNames, 'a field'),
    };
  }

  /** The meaning of an action term or a Lagrangian, with the warnings that it deserves. */
  private expression(written: string, path: Path, kind: 'lattice' | 'continuum'): Expression {
    const { text } = this;
    const names = this.names[kind];
    const read = (tree: Tree): Expression =>
      kind === 'lattice' ? readLatticeExpression(tree, names) : readContinuumExpression(tree, names);
    const { tree, expression } = text.expression(written, path, (t) => {
      const tree = readTree(t);
      return { tree, expression: read(tree) };
    });
    if (expression.kind === 'constant')
      text.fail(
        expression.value.isZero ? 'this is zero' : 'no field stands in this expression',
        'write a function of the fields, or leave it out',
        path,
      );
    const angles = new Set(this.declared.fields.filter((f) => f.values.kind === 'angle').map((f) => f.name));
    for (const { field, name, span } of aperiodicArguments(tree, read, angles, kind)) {
      const argument = shortened(written.slice(span.start, span.end));
      text.warn(
        `${field} is an angle, but the argument "${argument}" of ${name} is not invariant under ${field} -> ${field} + 2 pi on one site`,
        path,
        span.start,
      );
    }
    if (kind === 'continuum') this.warnAboutSpacings(tree, path);
    return expression;
  }

  private warnAboutSpacings(tree: Tree, path: Path): void {
    const { limits } = this.declared.lattice;
    const seen = new Set<string>();
    for (const t of subtrees(tree))
      if (t.kind === 'symbol' && limits.includes(t.name) && !seen.has(t.name)) {
        seen.add(t.name);
        this.text.warn(
          `the spacing ${t.name} stands in the continuum Lagrangian, which has no limit as ${t.name} -> 0 unless that is meant`,
          path,
          t.span.start,
        );
      }
  }

  private quotients(
    data: Readonly<Record<string, string>>,
    key: 'matching' | 'rescaling',
    known: readonly string[],
    what: string,
  ): Map<string, Quotient> {
    const out = new Map<string, Quotient>();
    for (const [left, right] of Object.entries(data)) {
      const path = ['proposal', key, left];
      const name = this.text.name(left, path, 'key');
      if (!known.includes(name))
        this.text.fail(
          `"${name}" is not ${what}`,
          known.length === 0 ? 'declare it, or leave this out' : `these are ${known.join(', ')}`,
          path,
          'key',
        );
      if (out.has(name)) this.text.fail(`"${name}" stands twice here`, 'keep one of the two', path, 'key');
      const value = this.text.expression(right, path, (t) => readQuotient(readTree(t), this.names.matching));
      if (key === 'rescaling' && value.isZero)
        this.text.fail('a field is rescaled by zero', 'write a factor that is not zero', path);
      out.set(name, value);
    }
    return out;
  }
}

/** Refuses what the schema has a place for and the analyses of this version do not handle. */
function refuseUnhandled({ parent, lattice }: CaseData, text: CaseText): void {
  const handles = 'this version handles actions on orthogonal lattices, with cosines or polynomials';
  if (parent.hamiltonian !== undefined)
    text.fail(
      'a parent Hamiltonian is not analysed',
      `${handles}; write the action in imaginary time under action instead`,
      ['parent', 'hamiltonian'],
      'key',
    );
  if (lattice.vectors)
    text.fail(
      'lattice vectors are not analysed',
      `${handles}; leave vectors out and write the bonds in shifts along the axes`,
      ['lattice', 'vectors'],
      'key',
    );
  if (parent.compactness !== undefined && parent.compactness !== 'cosine')
    text.fail(
      `the compactness ${parent.compactness} is not analysed`,
      `${handles}; write compactness: cosine instead`,
      ['parent', 'compactness'],
    );
  if (!parent.action)
    text.fail(
      '"action" is missing',
      'list the terms of the lattice action, e.g. action: [{name: x-link, term: "beta*(1 - cos(Delta_x phi))"}]',
      ['parent'],
    );
}
