// Point group elements as entries of the list of symmetries: what each does to the coordinates and to the fields.

import type { Analyses } from '../rules/facts.ts';
import type { PointElement } from '../symmetry/pointGroup.ts';

/** Image of each axis and field in words, e.g. `x -> y, y -> -x; phi -> -phi`; only what changes is written. */
export function elementWords(
  element: PointElement,
  axes: readonly string[],
  fields: readonly string[],
): string {
  const coordinates = element.matrix.flatMap((row, i) => {
    const image = row
      .flatMap((entry, k) => (entry === 0 ? [] : [`${entry < 0 ? '-' : '+'}${axes[k]}`]))
      .join('');
    const shown = image.startsWith('+') ? image.slice(1) : image;
    return shown === axes[i] ? [] : [`${axes[i]} -> ${shown}`];
  });
  const values = element.fields.flatMap(({ field, sign }, i) =>
    field === i && sign === 1 ? [] : [`${fields[i]} -> ${sign < 0 ? '-' : ''}${fields[field]}`],
  );
  return [coordinates.join(', '), values.join(', ')].filter((s) => s !== '').join('; ') || 'identity';
}

const isIdentity = (e: PointElement): boolean =>
  e.matrix.every((row, i) => row.every((x, k) => x === (i === k ? 1 : 0)));

/** Of an element and its product with φ → -φ, the one with fewer signs. */
function hasFewerSigns(e: PointElement): boolean {
  const negative = e.fields.filter((f) => f.sign < 0).length;
  return negative * 2 < e.fields.length || (negative * 2 === e.fields.length && e.fields[0]?.sign === 1);
}

/** Every element but the identity. Where φ → -φ alone is a symmetry it is listed once, as internal, and its products
 *  with the other elements are left out. `continuum` is known for all elements or for none, by the two group orders. */
export function pointSymmetries({ pointGroup: g, case: theCase }: Analyses): object[] {
  const axes = theCase.lattice.axes.map((axis) => axis.name);
  const fields = theCase.fields.map((field) => field.name);
  const continuum = g.continuumOrder === g.holohedry ? true : null;
  const flip = (e: PointElement): boolean =>
    isIdentity(e) && e.fields.every((f, i) => f.field === i && f.sign < 0);
  return g.elements
    .filter((e) => elementWords(e, axes, fields) !== 'identity')
    .filter((e) => !g.fieldReflection || flip(e) || hasFewerSigns(e))
    .map((e) => {
      const kind = isIdentity(e) ? 'internal' : 'point';
      const words = elementWords(e, axes, fields);
      return {
        id: `${kind}: ${words}`,
        kind,
        statement: words,
        lattice: true,
        continuum,
        status: continuum ? 'survives' : null,
        growth: 0,
        brokenBy: null,
        certificate:
          'the terms of the action are mapped to themselves, up to translations and the parity of each function',
      };
    });
}
