import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../src/model/caseFile.ts';
import { caseJsonSchema, STATEMENTS } from '../../src/model/schema.ts';
import { starterCase } from '../../src/model/starter.ts';
import { YamlSource } from '../../src/model/yamlSource.ts';
import { printQuotient } from '../../src/notation/print.ts';
import { base, edited, errorOf, unmarked } from './marked.ts';

const read = (text: string) => readCase(text, 'sheet.yaml');
const xLink = '"J*(1 - cos(Delta_x phi))"';
const charge = '  - {id: charge, shift: "1", status: survives}\n';

describe('a case', () => {
  const theCase = read(base);
  it('has the axes, spacings, fields and parameters that it declares, in order', () => {
    expect(theCase.lattice.axes.map((x) => [x.name, x.spacing, x.role])).toEqual([
      ['tau', 'b', 'time'],
      ['x', 'a', 'space'],
      ['y', 'a', 'space'],
    ]);
    expect(theCase.fields.map((f) => [f.name, f.values.kind, f.at.join()])).toEqual([
      ['phi', 'angle', '0,0,0'],
    ]);
    expect(theCase.parameters).toEqual([
      { name: 'J0', positive: true },
      { name: 'J', positive: false },
    ]);
    expect(theCase.proposal!.parameters.map((p) => p.name)).toEqual(['K0', 'K']);
    expect([...theCase.proposal!.matching!].map(([k, q]) => `${k} = ${printQuotient(q)}`)).toEqual([
      'K0 = J0*b/a^2',
      'K = J/b',
    ]);
  });
  it('sends the time spacing to zero first unless it says otherwise', () => {
    expect(theCase.lattice.limits).toEqual(['b', 'a']);
    expect(read(`${base}limits: [a, b]\n`).lattice.limits).toEqual(['a', 'b']);
    const timeLast = base
      .replace('    tau: {spacing: b, role: time}\n', '')
      .replace('    y:   {spacing: a}\n', '    y:   {spacing: a}\n    tau: {spacing: b, role: time}\n');
    expect(read(timeLast).lattice.limits).toEqual(['b', 'a']);
  });
  it('keeps its text, its claims and where they stand', () => {
    expect(theCase.source).toBe(base);
    expect(theCase.claims.map((c) => [c.id, c.kind])).toEqual([
      ['charge', 'shift'],
      ['wall', 'configuration'],
      ['artefacts', 'corrections'],
    ]);
    const { position } = theCase.claims[0]!;
    expect(base.split('\n')[position.line - 1]!.slice(position.column - 1)).toMatch(/^\{id: charge/);
    expect(theCase.claims[1]).toMatchObject({
      field: 'phi',
      suppressed: { continuum: true, lattice: false },
    });
  });
  it('is the same from bytes, with a byte order mark, and with the line ends of another system', () => {
    const comparable = (c: ReturnType<typeof read>) => ({ ...c, source: '' });
    expect(comparable(readCase(Buffer.from(base), 'sheet.yaml'))).toEqual(comparable(theCase));
    expect(comparable(read(`\ufeff${base}`))).toEqual(comparable(theCase));
    expect(comparable(read(base.replaceAll('\n', '\r\n')))).toEqual(comparable(theCase));
  });
  it('reads yes, no, true and false alike', () => {
    for (const [yes, no] of [
      ['yes', 'no'],
      ['true', 'false'],
    ])
      expect(
        read(edited('{continuum: yes, lattice: no}', `{continuum: ${yes}, lattice: ${no}}, truncates: ${no}`))
          .claims[1],
      ).toMatchObject({ suppressed: { continuum: true, lattice: false }, truncates: false });
    expect(read(edited('J:  {}', 'J: {positive: yes}')).parameters[1]!.positive).toBe(true);
  });
  it('may leave out proposal, claims, title, parameters and settings', () => {
    const least = read(
      'case: least\nlattice: {axes: {x: {spacing: a}}}\nfields: {u: {values: real}}\nparent: {action: [{name: t, term: "(Delta_x u)^2"}]}\n',
    );
    expect(least).toMatchObject({
      title: 'least',
      proposal: undefined,
      claims: [],
      parameters: [],
      warnings: [],
    });
    expect(least.expand).toEqual({ beyondLeading: 4, fields: undefined, background: new Map() });
  });
  it('may be written in Greek, keys as well', () => {
    const greek = base
      .replace('    tau:', '    τ:')
      .replace('  phi:', '  φ:')
      .replace('Delta_tau phi', 'Δ_τ φ')
      .replace('d_tau phi', '∂_τ φ');
    const comparable = (c: ReturnType<typeof read>) => ({
      lattice: c.lattice,
      fields: c.fields,
      terms: c.parent.terms.map((t) => t.expression),
      lagrangian: c.proposal!.lagrangian,
    });
    expect(comparable(read(greek))).toEqual(comparable(theCase));
  });
  it('reads exact numbers from their digits and not from floats', () => {
    const { expand } = read(edited('beyond-leading: 4', 'background: {phi: 0.1000000000000000000000001}'));
    expect(`${expand.background.get('phi')}`).toBe('1000000000000000000000001/10000000000000000000000000');
    const halves = read(edited('suppressed: {continuum: yes, lattice: no}', 'exponent: {a: -1/2, l: 0.5}'))
      .claims[1];
    expect(halves).toMatchObject({ exponent: { a: '-1/2', l: '1/2' } });
  });
  it('tells theta the field from theta the step', () => {
    const theta = base.replaceAll('phi', 'theta');
    expect(read(theta).claims[1]).toMatchObject({ field: 'theta', profile: { text: 'theta(x)' } });
  });
  it('knows which field a claim is about when there are several', () => {
    const two = base
      .replace('  phi: {values: angle}', '  phi: {values: angle}\n  psi: {values: real}')
      .replace('shift: "1",', 'shift: "1", field: psi,')
      .replace('configuration: "theta(x)",', 'configuration: "theta(x)", field: φ,');
    expect(read(two).claims.slice(0, 2)).toMatchObject([{ field: 'psi' }, { field: 'phi' }]);
  });
});

describe('claims of every kind', () => {
  it.each([
    ['shift: "(-1)^x cos(2*pi*y/3)", status: lattice-only', { kind: 'shift', status: 'lattice-only' }],
    ['winding: phi, status: continuum-only', { kind: 'winding', text: 'phi', status: 'continuum-only' }],
    ['rotation: [x, y], status: absent', { kind: 'rotation', text: 'x, y' }],
    ['boost: [tau, x], status: absent', { kind: 'boost', text: 'tau, x' }],
    [
      'dilatation: {tau: 2, x: 1, y: "1/2"}, status: survives',
      { kind: 'dilatation', text: 'tau: 2, x: 1, y: 1/2' },
    ],
    ['point-group: {order: 8, name: 4mm}, status: survives', { kind: 'point-group', order: 8, name: '4mm' }],
    ['configuration: "f(x+y) + s(y)", truncates: no', { kind: 'configuration', truncates: false }],
    [
      'duality: {K: "1/(4*pi^2*K0)", K0: "1/(4*pi^2*K)"}, status: absent',
      { kind: 'duality', text: 'K -> 1/(4*pi^2*K0), K0 -> 1/(4*pi^2*K)' },
    ],
    [
      'corrections: {begin: {a: 2, b: 4}}',
      {
        kind: 'corrections',
        begin: new Map([
          ['a', 2],
          ['b', 4],
        ]),
      },
    ],
    ['count: "2*gcd(Lx, L_y) - 1", group: Z_3', { kind: 'count', group: 'Z_3' }],
  ])('are read: %s', (text, wanted) => {
    expect(read(edited(charge, `  - {id: charge, ${text}}\n`)).claims[0]).toMatchObject({
      id: 'charge',
      ...wanted,
    });
  });
});

describe('the place of an error inside a string', () => {
  const block = (value: string): string =>
    edited(`    - {name: x-link, term: ${xLink}}`, `    - name: x-link\n      term: ${value}`);
  it.each([
    ['plain', block('J*(1 - cos(¦Delta_z phi))')],
    ['plain over two lines', block('J*(1 -\n        cos(¦Delta_z phi))')],
    ['in single quotes', block("'J*(1 - cos(¦Delta_z phi))'")],
    ['in double quotes', block('"J*(1 - cos(¦Delta_z phi))"')],
    ['in double quotes over lines', block('"J*(1\n\n         - cos(¦Delta_z phi))"')],
    ['behind escaped letters', block('"\\x4A*(1 - cos(\\u03c6) - cos(¦Delta_z phi))"')],
    ['behind an escaped line end', block('"J*(1 \\\n         - cos(¦Delta_z phi))"')],
    ['in a literal block', block('|\n        J*(1\n          - cos(¦Delta_z phi))')],
    ['in a folded block', block('>-\n        J*(1\n        - cos(\n        ¦Delta_z phi))')],
    [
      'in a block with a comment and an indentation sign',
      block('|2- # bonds\n        J*(1\n        - cos(¦Delta_z phi))'),
    ],
    ['behind Greek letters', block('"J*(1 - cos(φ) - cos(¦Δ_z φ))"')],
    ['at an escaped letter', block('"J*(1 - cos(¦\\u0394_z phi))"')],
  ])('is found when it is written %s', (_, marked) => {
    const { text, line, column } = unmarked(marked);
    for (const written of [text, text.replaceAll('\n', '\r\n')]) {
      const error = errorOf(written);
      expect(error.problem).toBe('"z" is not an axis');
      expect(error.position).toMatchObject({ line, column });
    }
  });
});

describe('every character of a string', () => {
  it.each([
    ['in single quotes', "'it''s a ''rotor'' film'"],
    ['in double quotes', '"a \\"rotor\\" film \\u00e9 \\U0001F600 \\t end"'],
    ['without quotes', 'a film of rotors'],
  ])('stands where it was written %s', (_, written) => {
    const source = YamlSource.read(`title: ${written}\n`, 'x.yaml');
    const { title } = source.toPlain() as { title: string };
    for (let offset = 0; offset < title.length; offset++) {
      if (!/[a-z]/.test(title.charAt(offset))) continue;
      const { column } = source.positionInString(['title'], offset);
      expect(`title: ${written}`.charAt(column - 1)).toBe(title.charAt(offset));
    }
    const last = source.positionInString(['title'], title.length - 1);
    expect(`title: ${written}`.slice(last.column - 1).replace(/["']$/, '')).toBe(title.slice(-1));
  });
});

describe('a case is read with a warning', () => {
  const block = (value: string): string =>
    edited(`    - {name: x-link, term: ${xLink}}`, `    - name: x-link\n      term: ${value}`);
  it.each([
    ['a comment cuts an expression short', block('¦J*(1 - cos(Delta_x phi)) # + psi'), /comment/],
    [
      'an angle has a weight that is no integer',
      block('"J*(1 - cos(¦phi/2))"'),
      /not invariant under phi -> phi \+ 2 pi/,
    ],
    [
      'a central difference of an angle has half weights',
      block('"J*(1 - cos(¦Deltac_x phi))"'),
      /"Deltac_x phi" of cos/,
    ],
    ['a weight of an angle is a parameter', block('"J*(1 - sin(¦phi + J*phi))"'), /angle/],
    ['angles are multiplied inside a cosine', block('"J*(1 - cos(¦phi T_x phi))"'), /angle/],
    ['an angle is squared inside a cosine', block('"J*(1 - cos(¦phi^2))"'), /angle/],
    ['the Lagrangian holds a spacing', edited('K/2 (d_x phi)^2', 'K/2*¦a (d_x phi)^2'), /spacing a/],
    ['the Lagrangian has an aperiodic cosine', edited('K/2 (d_x phi)^2', 'K*cos(¦phi/3)'), /angle/],
  ])('when %s', (_, marked, says) => {
    const { text, line, column } = unmarked(marked);
    expect(read(text).warnings).toEqual([
      { text: expect.stringMatching(says), position: { file: 'sheet.yaml', line, column } },
    ]);
  });
  it.each([
    ['integer weights', '"J*(1 - cos(2 phi - 3 T_x phi))"'],
    ['a sine inside a cosine', '"J*(1 - cos(sin(phi)))"'],
    ['a polynomial outside', '"J*(Delta_x phi)^2"'],
    ['no quotes', 'J*(1 - cos(Delta_x phi))'],
  ])('but not for %s', (_, term) => {
    expect(read(block(term)).warnings).toEqual([]);
  });
});

describe('cases that come with the program', () => {
  const folder = new URL('../../cases/', import.meta.url);
  it('are read without a warning', () => {
    for (const name of readdirSync(folder))
      expect(readCase(readFileSync(new URL(name, folder)), name).warnings, name).toEqual([]);
  });
  it('start with one that has a comment on everything that is not plain', () => {
    const starter = starterCase('my-sheet');
    expect(readCase(starter, '-')).toMatchObject({ id: 'my-sheet', warnings: [] });
    expect(starter.match(/ #/g)!.length).toBeGreaterThan(8);
    for (const line of starter.split('\n')) expect(line.length).toBeLessThanOrEqual(110);
  });
});

describe('the published schema', () => {
  interface Node {
    readonly type?: string;
    readonly properties?: Record<string, Node>;
    readonly additionalProperties?: Node | boolean;
    readonly required?: readonly string[];
    readonly items?: Node;
    readonly anyOf?: readonly Node[];
  }
  const schema = caseJsonSchema() as Node;
  const nodes = (n: Node): Node[] => [
    n,
    ...Object.values(n.properties ?? {}).flatMap(nodes),
    ...(typeof n.additionalProperties === 'object' ? nodes(n.additionalProperties) : []),
    ...(n.items ? nodes(n.items) : []),
    ...(n.anyOf ?? []).flatMap(nodes),
  ];
  it('allows no unknown keys anywhere', () => {
    for (const node of nodes(schema).filter((n) => n.properties))
      expect(node.additionalProperties).toBe(false);
  });
  it('requires what a case cannot do without', () => {
    expect(schema.required).toEqual(['case', 'lattice', 'fields', 'parent']);
  });
  it('has one alternative for each statement, in the order in which messages look them up', () => {
    const alternatives = schema.properties!.claims!.items!.anyOf!;
    expect(
      alternatives.map((a) => a.required!.find((k) => (STATEMENTS as readonly string[]).includes(k))),
    ).toEqual([...STATEMENTS]);
  });
  it('is plain data that survives being written out', () => {
    expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
  });
});
