// Wrong case files: each is refused at the place where it is wrong, with words on how to mend it, and nothing but an
// InputError ever comes out.

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../src/model/caseFile.ts';
import { starterCase } from '../../src/model/starter.ts';
import { InputError } from '../../src/notation/source.ts';
import { base, edited, errorOf, unmarked } from './marked.ts';

type Row = readonly [what: string, marked: string, says: RegExp];

const xLink = '"J*(1 - cos(Delta_x phi))"';
const lagrangian = '"K0/2 (d_tau phi)^2 + K/2 (d_x phi)^2"';
const charge = '{id: charge, shift: "1", status: survives}';
const wall = '{id: wall, configuration: "theta(x)", suppressed: {continuum: yes, lattice: no}}';
const artefacts = '{id: artefacts, corrections: {begin: 2}}';
const term = (text: string): string => edited(xLink, text);
const claim = (text: string): string => edited(charge, text);
const twoFields = (text: string): string =>
  text.replace('  phi: {values: angle}', '  phi: {values: angle}\n  psi: {values: real}');

const yaml: readonly Row[] = [
  ['an empty file', '¦', /empty/],
  ['a file of comments', '¦# nothing here\n', /empty/],
  ['a document without a value', '¦---\n', /empty/],
  ['a file that is one word', '¦rotors\n', /map of keys/],
  ['a list instead of a case', '¦- case: sheet\n', /map of keys/],
  ['two documents', `${base}¦---\ncase: other\n`, /more than one/],
  ['a directive', `¦%YAML 1.1\n---\n${base}`, /directive/],
  [
    'a duplicate key',
    edited('  phi: {values: angle}', '  phi: {values: angle}\n  ¦phi: {values: real}'),
    /twice/,
  ],
  ['a duplicate key at the top', `${base}¦title: again\n`, /twice/],
  ['an alias', edited('title: Rotors', 'title: ¦*x'), /alias/],
  ['an anchor', edited('title: Rotors', 'title: &x ¦Rotors'), /anchor/],
  ['a tag', edited('title: Rotors', 'title: !!str ¦Rotors'), /tag/],
  ['an unknown tag', edited('title: Rotors', 'title: ¦!js/function Rotors'), /tag/],
  ['a merge key', `${base}¦<<: {title: other}\n`, /not a key/],
  ['a prototype key', `${base}¦__proto__: {title: other}\n`, /not a key/],
  ['a number as a key', edited('  J:  {}', '  ¦1: {}'), /key must be a word/],
  ['a list as a key', edited('  J:  {}', '  ? ¦[J, K]\n  : {}'), /key must be a word/],
  ['a tab as indentation', edited('  phi: {values', '¦\tphi: {values'), /tab/],
  ['a quote that is never closed', 'case: sheet\ntitle: ¦"Rotors\nlattice: x\n', /never closed/],
  ['a bracket that is never closed', `case: sheet\nlattice: {axes: {x: {spacing: a}\n¦`, /./],
  ['two colons on one line', edited('title: Rotors', 'title: ¦Rotors: a study'), /": "/],
  ['an escape in LaTeX', term('"J*(1 - ¦\\cos(Delta_x phi))"'), /backslash/],
  ['a letter swallowed by an escape', term('¦"J*(1 - cos(Delta_\\tau phi))"'), /escape of YAML/],
  ['a control character', edited('title: Rotors', 'title: Ro¦\u001b[31mtors'), /U\+001B/],
  ['a NUL byte', edited('title: Rotors', 'title: Ro¦\u0000tors'), /U\+0000/],
  ['half a surrogate pair', edited('title: Rotors', 'title: Ro¦\ud800tors'), /U\+D800/],
];

const shape: readonly Row[] = [
  ['an unknown key with a near miss', `${base}¦clams: []\n`, /not a key/],
  ['an unknown key inside', edited('{spacing: a}\n    y:', '{¦spacings: a}\n    y:'), /not a key/],
  [
    'a missing part',
    base.replace(/^parent:[\s\S]*?(?=^proposal)/m, '').replace(/^/, '¦'),
    /"parent" is missing/,
  ],
  ['a missing term', edited(`{name: x-link, term: ${xLink}}`, '¦{name: x-link}'), /"term" is missing/],
  [
    'a missing action',
    edited(base.slice(base.indexOf('  action:'), base.indexOf('  compactness')), '').replace(
      '  compactness',
      '  ¦compactness',
    ),
    /"action" is missing/,
  ],
  [
    'an action that is one string',
    edited(base.slice(base.indexOf('  action:'), base.indexOf('  compactness')), '  action: ¦"J phi^2"\n'),
    /must be a list/,
  ],
  ['a map where a string belongs', edited('title: Rotors', 'title: ¦{en: Rotors}'), /must be a string/],
  ['a number where a string belongs', edited('title: Rotors', 'title: ¦2024'), /reads as a number/],
  ['a number as a term', term('¦0'), /reads as a number/],
  ['an empty string as a term', term('¦""'), /empty/],
  [
    'an empty list of terms',
    edited(base.slice(base.indexOf('  action:'), base.indexOf('  compactness')), '  action: ¦[]\n'),
    /too few/,
  ],
  ['an empty map', edited('fields:\n  phi: {values: angle}', 'fields: ¦{}'), /no field/],
  ['nothing behind a key', edited('expand: {beyond-leading: 4}', 'expand:¦'), /empty/],
  ['a bad identifier of the case', edited('case: sheet', 'case: ¦My Sheet'), /identifier/],
  ['a bad identifier of a claim', claim('{id: ¦Charge!, shift: "1", status: survives}'), /identifier/],
  ['a wrong status', claim('{id: charge, shift: "1", status: ¦survive}'), /not known/],
  ['a wrong role', edited('role: time', 'role: ¦tim'), /not known/],
  ['values that do not exist', edited('values: angle', 'values: ¦angel'), /values/],
  ['an order that is no integer', edited('beyond-leading: 4', 'beyond-leading: ¦1.5'), /integer/],
  ['an order that is too high', edited('beyond-leading: 4', 'beyond-leading: ¦17'), /out of range/],
  ['a negative order', edited('beyond-leading: 4', 'beyond-leading: ¦-1'), /out of range/],
  ['a positive that is neither yes nor no', edited('J:  {}', 'J:  {positive: ¦maybe}'), /does not fit/],
  ['an unquoted comma', claim('{id: charge, shift: f(x, ¦tau), status: survives}'), /not a key/],
];

const names: readonly Row[] = [
  ['a parameter called like a field', edited('  J:  {}', '  ¦phi: {}'), /already the name/],
  [
    'a parameter of the proposal called like one of the parent',
    edited('{K0: {positive: true}, K: {}}', '{K0: {}, ¦J: {}}'),
    /already the name/,
  ],
  [
    'a spacing called like an axis',
    edited('{spacing: a}\n    y:', '{spacing: ¦y}\n    y:'),
    /already the name/,
  ],
  ['two spellings of one name', edited('  J:  {}', '  mu: {}\n  ¦μ: {}'), /already the name/],
  ['a reserved name', edited('  J:  {}', '  ¦pi: {}'), /meaning of its own/],
  ['a name that reads as an operator', edited('  J:  {}', '  ¦T_x: {}'), /operator/],
  ['a name with a sign in it', edited('  J:  {}', '  ¦J-1: {}'), /cannot be a name/],
  ['a name in parentheses', edited('  J:  {}', '  ¦(J): {}'), /cannot be a name/],
  ['a name that is too long', edited('  J:  {}', `  ¦${'J'.repeat(41)}: {}`), /too long/],
  [
    'a second time axis',
    edited('{spacing: a}\n    y:', '{spacing: a, role: ¦time}\n    y:'),
    /second time axis/,
  ],
  [
    'five axes',
    edited('    y:   {spacing: a}', '    y:   {spacing: a}\n    z: {spacing: a}\n    ¦w: {spacing: a}'),
    /5 axes/,
  ],
  ['no axis', base.replace(/ {2}axes:[\s\S]*?(?=^fields)/m, '  axes: ¦{}\n'), /no axis/],
  ['limits with a name that is no spacing', `${base}limits: [b, ¦c]\n`, /not a spacing/],
  ['limits that forget a spacing', `${base}limits: ¦[a]\n`, /"b" is missing/],
  ['limits that repeat a spacing', `${base}limits: [a, ¦a]\n`, /twice/],
  ['a background of what is no field', edited('beyond-leading: 4', 'background: {¦psi: 0}'), /not a field/],
  ['a background that is not exact', edited('beyond-leading: 4', 'background: {phi: ¦1e-3}'), /exact number/],
  [
    'a background with a zero denominator',
    edited('beyond-leading: 4', 'background: {phi: ¦1/0}'),
    /exact number/,
  ],
];

const expressions: readonly Row[] = [
  ['an operator along an unknown axis', term('"J*(1 - cos(¦Delta_z phi))"'), /not an axis/],
  ['an undeclared parameter', term('"J*(1 - ¦B*cos(Delta_x phi))"'), /not declared/],
  ['a misspelt parameter', term('"¦J00*(1 - cos(Delta_x phi))"'), /not declared/],
  ['a parameter of the proposal in the action', term('"¦K*(1 - cos(Delta_x phi))"'), /of the proposal/],
  ['a parameter of the parent in the proposal', edited(lagrangian, '"¦J/2 (d_x phi)^2"'), /of the parent/],
  ['a coordinate in the action', term('"¦x*(1 - cos(Delta_x phi))"'), /coordinate/],
  ['a derivative in the action', term('"J*(¦d_x phi)^2"'), /lattice action/],
  ['a difference in the Lagrangian', edited(lagrangian, '"K/2 (¦Delta_x phi)^2"'), /continuum Lagrangian/],
  ['an ambiguous power', edited(lagrangian, '"K/2 ¦d_x phi^2"'), /can mean/],
  ['a zero denominator', term('"J/¦0*(1 - cos(Delta_x phi))"'), /denominator is zero/],
  ['a zero denominator in disguise', term('"J/(¦1/2 - 0.5)*phi"'), /denominator is zero/],
  ['a zero denominator of an operator', term('"J*((Delta_x/¦0) phi)^2"'), /denominator is zero/],
  ['an unknown function', term('"J*(1 - ¦coz(Delta_x phi))"'), /not a function/],
  ['a product that reads as a function', term('"¦J(1 - cos(Delta_x phi))"'), /reads as a function/],
  ['a field with arguments', term('"J*(1 - cos(¦phi(x)))"'), /reads as a function/],
  ['a function of a constant', term('"J*¦exp(1) phi^2"'), /no exact value/],
  ['a division by what vanishes', term('"J/¦phi^2"'), /vanishes/],
  ['a division by a constant that is a sum', term('"J/(¦J + J0 + phi)"'), /is a sum/],
  ['a logarithm of what vanishes', term('"J*¦log(phi)"'), /expanded/],
  ['an exponential about one', term('"J*¦exp(1 + phi)"'), /expanded/],
  ['a root of an undeclared sign', term('"¦sqrt(J^2)*phi^2"'), /positive/],
  ['a root of a negative number', term('"¦sqrt(0 - 2)*phi^2"'), /root/],
  ['a cube root of a field', term('"J*(1 + phi)^(¦1/3)"'), /no power/],
  ['an exponent that is a parameter', term('"(1 + phi)^¦J"'), /rational number/],
  ['a field where a constant belongs', term('"J*((¦phi Delta_x) phi)^2"'), /constant belongs/],
  ['an operator on a constant', term('"Delta_x ¦J*phi"'), /acts on a constant/],
  ['an operator with nothing behind it', term('"¦J*Delta_x"'), /nothing to act on/],
  ['a derivative of a product', edited(lagrangian, '"K/2 ¦d_x (phi^2)"'), /product/],
  ['an inverse of a difference', term('"J*((¦Delta_x^-1) phi)^2"'), /no power/],
  ['a term without a field', term('¦"J"'), /no field/],
  ['a term that cancels', term('¦"J*phi^2 - J phi phi"'), /zero/],
  ['a bracket that is never closed', term('"J*¦(1 - cos(Delta_x phi)"'), /never closed/],
  [
    'parentheses 20,000 deep',
    term(`"${'('.repeat(200)}¦${'('.repeat(9_500)}phi${')'.repeat(9_700)}"`),
    /nested/,
  ],
  ['an expression of 100,000 characters', term(`"${'('.repeat(20_000)}¦${'('.repeat(80_000)}"`), /longer/],
  ['a power of powers', term('"(¦(phi^20)^20)^20"'), /power beyond/],
  ['a shift of powers', term('"J*((¦(T_x^24)^24) phi)^2"'), /reaches/],
  ['a coefficient that explodes', term('"(¦(J + J0 + a + b)^24)^24*phi^2"'), /multiplied out/],
  ['a number that explodes', term('"(¦(9^999)^999)^999*phi^2"'), /multiplied out/],
  [
    'an operator that explodes',
    term('"J*(((¦(Delta_x + Delta_y + Delta_tau)^20)) phi)^2"'),
    /multiplied out|reaches/,
  ],
  [
    'nested differences that explode',
    term(`"${'Delta_x (sin('.repeat(39)}¦${'Delta_x (sin('.repeat(11)}phi${'))'.repeat(50)}"`),
    /parts/,
  ],
  ['differences that reach too far', term(`"¦${'Delta_x ('.repeat(100)}phi^2${')'.repeat(100)}"`), /reaches/],
  [
    'derivatives of too high an order',
    edited(lagrangian, `"¦${'d_x ('.repeat(65)}phi${')'.repeat(65)}"`),
    /reaches/,
  ],
];

const proposals: readonly Row[] = [
  ['a matching of no parameter', edited('K: "J/b"}', '¦K1: "J/b"}'), /not a parameter/],
  ['a matching by a parameter of the proposal', edited('K: "J/b"}', 'K: "J/b + ¦K0"}'), /proposal itself/],
  ['a matching with an undeclared spacing', edited('K: "J/b"}', 'K: "J/¦c"}'), /not declared/],
  ['a matching by a field', edited('K: "J/b"}', 'K: "J*¦phi"}'), /constant belongs/],
  ['a rescaling of no field', edited('K: "J/b"}', 'K: "J/b"}\n  rescaling: {¦psi: "a"}'), /not a field/],
  ['a rescaling by zero', edited('K: "J/b"}', 'K: "J/b"}\n  rescaling: {phi: ¦"a - a"}'), /zero/],
];

const claims: readonly Row[] = [
  ['no statement', claim('¦{id: charge, status: survives}'), /states nothing/],
  ['a misspelt statement', claim('{id: charge, ¦shft: "1", status: survives}'), /not a key/],
  ['two statements', claim('{id: charge, shift: "1", ¦winding: phi, status: survives}'), /not a key/],
  ['a claim that is a word', claim('¦charge'), /does not fit/],
  ['no status', claim('¦{id: charge, shift: "1"}'), /"status" is missing/],
  ['an id twice', edited(artefacts, '{id: ¦wall, corrections: {begin: 2}}'), /second claim/],
  [
    'a profile of an unknown coordinate',
    claim('{id: charge, shift: "f(¦z)", status: survives}'),
    /not a coordinate/,
  ],
  [
    'a profile with an unknown function',
    claim('{id: charge, shift: "¦k(x)", status: survives}'),
    /not known/,
  ],
  ['a step as a shift', claim('{id: charge, shift: "¦theta(x)", status: survives}'), /not known/],
  ['an operator in a profile', claim('{id: charge, shift: "¦Delta_x f(x)", status: survives}'), /operator/],
  [
    'a coordinate with arguments',
    claim('{id: charge, shift: "¦x(y)", status: survives}'),
    /reads as a function/,
  ],
  [
    'a configuration about which nothing is said',
    edited(wall, '¦{id: wall, configuration: "theta(x)"}'),
    /says nothing/,
  ],
  [
    'an exponent that is no number',
    edited(wall, '{id: wall, configuration: "theta(x)", exponent: {a: ¦half, l: 1}}'),
    /exact number/,
  ],
  [
    'corrections from order 0',
    edited(artefacts, '{id: artefacts, corrections: {begin: ¦0}}'),
    /out of range|does not fit/,
  ],
  [
    'corrections in what is no spacing',
    edited(artefacts, '{id: artefacts, corrections: {begin: {¦c: 2}}}'),
    /not a spacing/,
  ],
  [
    'a point group without order and name',
    claim('{id: charge, point-group: ¦{}, status: survives}'),
    /no point group/,
  ],
  ['a count in what is no size', claim('{id: charge, count: "¦Lz + 1", group: U(1)}'), /not a size/],
  ['a count in the extent of time', claim('{id: charge, count: "¦Ltau", group: U(1)}'), /not a size/],
  [
    'a count with an unknown function',
    claim('{id: charge, count: "¦lcm(Lx, Ly)", group: U(1)}'),
    /not known/,
  ],
  ['a count of no group', claim('{id: charge, count: "1", group: ¦SU(2)}'), /group|factor/],
  ['winding of what is no field', claim('{id: charge, winding: ¦psi, status: absent}'), /not a field/],
  ['a rotation into time', claim('{id: charge, rotation: ¦[x, tau], status: absent}'), /two axes of space/],
  ['a rotation of one axis', claim('{id: charge, rotation: ¦[x, x], status: absent}'), /different/],
  ['a rotation of three axes', claim('{id: charge, rotation: ¦[x, y, tau], status: absent}'), /many/],
  ['a dilatation of no axis', claim('{id: charge, dilatation: {¦z: 1}, status: absent}'), /not an axis/],
  ['a dual of no parameter', claim('{id: charge, duality: {¦J: "1/K"}, status: absent}'), /not a parameter/],
  [
    'a dual in parameters of the parent',
    claim('{id: charge, duality: {K: "1/¦J"}, status: absent}'),
    /parent/,
  ],
  [
    'a duality without a proposal',
    claim('{id: charge, ¦duality: {K: "1/K0"}, status: absent}').replace(
      /^proposal:[\s\S]*?(?=^expand)/m,
      '',
    ),
    /without a proposal/,
  ],
  [
    'a shift that does not name its field',
    twoFields(claim('¦{id: charge, shift: "1", status: survives}')),
    /which field/,
  ],
  ['a shift of no field', claim('{id: charge, shift: "1", field: ¦psi, status: survives}'), /not a field/],
];

const unhandled: readonly Row[] = [
  ['a Hamiltonian', edited('  compactness: cosine', '  ¦hamiltonian: "J/2 pi_phi^2"'), /Hamiltonian/],
  [
    'lattice vectors',
    edited('fields:\n', '  ¦vectors: {x: ["1", "0"], y: ["1/2", "sqrt(3)/2"]}\nfields:\n'),
    /vectors/,
  ],
  ['a Villain action', edited('compactness: cosine', 'compactness: ¦villain'), /compactness/],
  ['a flat Villain action', edited('compactness: cosine', 'compactness: ¦villain-flat'), /compactness/],
  ['integer fields', edited('values: angle', 'values: ¦integer'), /not analysed/],
  ['residue fields', edited('values: angle', 'values: ¦residue 3'), /not analysed/],
  ['fields on links', edited('{values: angle}', '{values: angle, ¦at: [0, "1/2", 0]}'), /off the sites/],
  [
    'an offset of the wrong length',
    edited('{values: angle}', '{values: angle, at: ¦[0, 0]}'),
    /entries for 3 axes/,
  ],
];

describe.each([
  ['YAML', yaml],
  ['the shape', shape],
  ['names', names],
  ['expressions', expressions],
  ['the proposal', proposals],
  ['claims', claims],
  ['what later versions handle', unhandled],
])('wrong input in %s', (_, rows) => {
  it.each(rows)('%s is refused where it stands, with a mend', (_what, marked, says) => {
    const { text, line, column } = unmarked(marked);
    const error = errorOf(text);
    expect(error.problem).toMatch(says);
    expect(error.position).toEqual({ file: 'sheet.yaml', line, column });
    expect(error.mend.length).toBeGreaterThan(5);
    expect(error.message).toBe(`sheet.yaml:${line}:${column}: ${error.problem} — ${error.mend}`);
  });
});

describe('bytes that are no case', () => {
  const bytes = (...parts: (string | number[])[]): Uint8Array =>
    Buffer.concat(parts.map((p) => Buffer.from(p as string)));
  it.each<[string, Uint8Array, number, number, RegExp]>([
    ['more than a megabyte', Buffer.alloc(10_000_000, '# long\n'), 1, 1, /10000000 bytes/],
    ['a byte that is no UTF-8', bytes('case: sheet\ntitle: é', [0xff], '\n'), 2, 9, /not UTF-8/],
    ['a character that is cut off', bytes('case: sheet\ntitle: ', [0xe2, 0x82]), 2, 8, /not UTF-8/],
    ['UTF-16', bytes([0xff, 0xfe], 'c\0a\0s\0e\0'), 1, 1, /UTF-16/],
    ['an executable', bytes('\x7fELF\x02\x01\x01', [0, 0, 0]), 1, 1, /U\+007F/],
  ])('%s is refused', (_, input, line, column, says) => {
    const error = errorOf(input);
    expect(error.problem).toMatch(says);
    expect(error.position).toEqual({ file: 'sheet.yaml', line, column });
    expect(error.mend.length).toBeGreaterThan(5);
  });

  it('a text of more than a megabyte is refused as its bytes are', () => {
    expect(errorOf('é'.repeat(600_000)).problem).toMatch(/1200000 bytes/);
  });

  it('every byte value on its own is accepted or refused as input', () => {
    for (let b = 0; b < 256; b++) expect(errorOf(Uint8Array.of(b))).toBeInstanceOf(InputError);
  });
});

describe('hostile YAML is refused without delay or overflow', () => {
  const deep = /deeper than 50 levels/;
  it.each<[string, string, RegExp]>([
    ['flow lists 100,000 deep', `title: ${'['.repeat(100_000)}`, /./],
    ['closed flow lists 100,000 deep', `title: ${'['.repeat(100_000)}${']'.repeat(100_000)}`, deep],
    ['flow maps 50,000 deep', `title: ${'{a: '.repeat(50_000)}${'}'.repeat(50_000)}`, deep],
    ['block lists 100,000 deep', `${'- '.repeat(100_000)}x`, deep],
    ['keys of keys 100,000 deep', `${'? '.repeat(100_000)}x`, deep],
    ['block maps 1,000 deep', Array.from({ length: 1000 }, (_, k) => `${' '.repeat(k)}a:\n`).join(''), deep],
    ['lists 51 deep', `title: ${'['.repeat(51)}${']'.repeat(51)}`, deep],
    [
      'an alias bomb',
      `a: &a [x,x,x,x,x,x,x,x]\n${'bcdefghij'
        .split('')
        .map((k, i) => `${k}: &${k} [${Array(8).fill(`*${'abcdefghi'[i]}`).join(',')}]`)
        .join('\n')}\n`,
      /anchor|alias/,
    ],
    [
      '30,000 keys',
      `{${Array.from({ length: 30_000 }, (_, i) => `k${i}: `).join(',')}}`,
      /not a key|missing/,
    ],
    ['100,000 documents', '---\n'.repeat(100_000), /more than one/],
    ['20,000 claims', `${base}${'  - {id: x}\n'.repeat(20_000)}`, /many/],
    [
      '61 terms',
      edited(
        '    - {name: x-link',
        `${Array.from({ length: 60 }, (_, i) => `    - {name: t${i}, term: "phi^2"}\n`).join('')}    - {name: x-link`,
      ),
      /many/,
    ],
    [
      '61 parameters',
      edited('  J:  {}', `  J:  {}\n${Array.from({ length: 60 }, (_, i) => `  q${i}: {}\n`).join('')}`),
      /62 parameters/,
    ],
  ])('%s', (_, text, says) => {
    const error = errorOf(text);
    expect(error.problem).toMatch(says);
    expect(error.mend.length).toBeGreaterThan(5);
  });

  it('brackets in comments and strings do not count as nesting', () => {
    const brackets = `# ${'['.repeat(200)}\n`;
    expect(readCase(brackets + edited('title: Rotors', `title: "${'{'.repeat(200)}"`), 'x.yaml').id).toBe(
      'sheet',
    );
  });
});

describe('any damage to a case', () => {
  const starter = starterCase('sheet');
  const damage = fc.tuple(
    fc.nat({ max: starter.length }),
    fc.nat({ max: 12 }),
    fc.oneof(
      fc.string({ maxLength: 4 }),
      fc.constantFrom(
        '"',
        "'",
        '{',
        '}',
        '[',
        ']',
        ': ',
        '- ',
        '\n',
        '  ',
        '#',
        '&a ',
        '*a',
        '(',
        ')',
        '^',
        '/0',
        'Delta_',
        'd_x ',
        'phi',
        '1e9',
        '|',
        '>',
        '!',
        '~',
        'null',
        'é',
        '∂',
      ),
    ),
  );
  it('gives a case or an InputError that names a place in the file, never another error', () => {
    fc.assert(
      fc.property(fc.array(damage, { minLength: 1, maxLength: 3 }), (hits) => {
        let text = starter;
        for (const [at, removed, added] of hits) text = text.slice(0, at) + added + text.slice(at + removed);
        try {
          expect(readCase(text, 'x.yaml').file).toBe('x.yaml');
        } catch (error) {
          if (!(error instanceof InputError)) throw error;
          const { line, column } = error.position;
          const lines = text.split('\n');
          expect(line).toBeGreaterThan(0);
          expect(line).toBeLessThanOrEqual(lines.length + 1);
          expect(column).toBeGreaterThan(0);
          expect(column).toBeLessThanOrEqual((lines[line - 1]?.length ?? 0) + 1);
          expect(error.mend).not.toBe('');
        }
      }),
      { numRuns: 300 },
    );
  });
});
