// The point group of an orthogonal lattice action: signed permutations of the space axes that exchange axes of equal spacing
// only (the automorphisms of the Gram matrix), combined with the reflection of time and with signs and permutations of the
// fields. An element is a symmetry iff it maps the action to itself up to lattice translations (canonicalAction.ts).

import type { ActionTerm } from '../model/action.ts';
import { canonicalAction, isInvariant, type LatticeMap } from '../model/canonicalAction.ts';
import { type Field, type Lattice, spaceAxes, timeAxis } from '../model/geometry.ts';
import { LimitError } from '../notation/source.ts';
import { crystalClass } from './crystalClass.ts';

/** A lattice automorphism with the field action that makes it a symmetry. */
export interface PointElement {
  /** Signed permutation matrix on all axes: new coordinate i is Σ_k matrix[i][k] x_k. */
  readonly matrix: readonly (readonly number[])[];
  /** Image of each field: index and sign. */
  readonly fields: readonly { readonly field: number; readonly sign: 1 | -1 }[];
}

export interface PointGroupAnalysis {
  /** Order of the space part alone on the lattice, the number a claim quotes. */
  readonly order: number;
  /** Crystallographic name of the space part where it has one. */
  readonly name: string | undefined;
  /** Order of the lattice's own automorphism group (space part). */
  readonly holohedry: number;
  readonly generators: readonly string[];
  /** t → −t with no action on the fields. */
  readonly timeReflection: boolean;
  /** φ → −φ for all fields alone. */
  readonly fieldReflection: boolean;
  /** All symmetries, those with time reflection and field action included. */
  readonly elements: readonly PointElement[];
  /** Order of the space part of those lattice maps that leave the proposal as it is; null without one. */
  readonly continuumOrder: number | null;
}

type Matrix = readonly (readonly number[])[];

export interface PointGroupInput {
  readonly lattice: Lattice;
  readonly fields: readonly Field[];
  readonly terms: readonly Pick<ActionTerm, 'expression'>[];
  /** Whether an element leaves the continuum action as it is. */
  readonly continuum?: (element: PointElement) => boolean;
}

/** Above this number of field permutations with signs the search would not end soon. */
const MOST_FIELD_ACTIONS = 400;

/** Throws LimitError when the action or the number of fields is too large. */
export function analysePointGroup(input: PointGroupInput): PointGroupAnalysis {
  const { lattice, fields, terms } = input;
  const action = canonicalAction({ kind: 'sum', terms: terms.map((t) => t.expression) });
  const candidates = latticeMaps(lattice).flatMap((matrix) =>
    fieldActions(fields).map((images): PointElement => ({ matrix, fields: images })),
  );
  const members = subgroup(candidates, (e) => isInvariant(action, asMap(e, fields)));
  const elements = candidates.filter((e) => members.has(elementKey(e)));
  const space = spaceAxes(lattice);
  const spatial = spaceParts(elements, space);
  const time = timeAxis(lattice);
  const isTrivial = (e: PointElement): boolean => e.fields.every((f, i) => f.field === i && f.sign === 1);
  const isIdentity = (m: Matrix, except?: number): boolean =>
    m.every((row, i) => row[i] === (i === except ? -1 : 1));
  return {
    order: spatial.length,
    name: crystalClass(spatial),
    holohedry: spaceParts(candidates, space).length,
    generators: generators(
      spatial,
      space.map((k) => lattice.axes[k]!.name),
    ),
    timeReflection: time !== undefined && elements.some((e) => isTrivial(e) && isIdentity(e.matrix, time)),
    fieldReflection: elements.some(
      (e) => isIdentity(e.matrix) && e.fields.every((f, i) => f.field === i && f.sign === -1),
    ),
    elements,
    continuumOrder: input.continuum ? spaceParts(elements.filter(input.continuum), space).length : null,
  };
}

function asMap(element: PointElement, fields: readonly Field[]): LatticeMap {
  return {
    matrix: element.matrix,
    fields: new Map(
      fields.map((f, i) => {
        const image = element.fields[i]!;
        return [f.name, { name: fields[image.field]!.name, sign: image.sign }];
      }),
    ),
  };
}

/** Signed permutations of all axes: space axes of equal spacing among themselves, time by its sign. */
function latticeMaps(lattice: Lattice): Matrix[] {
  const { axes } = lattice;
  let maps: { image: number[]; signs: number[] }[] = [{ image: [], signs: [] }];
  for (const axis of axes)
    maps = maps.flatMap(({ image, signs }) =>
      axes.flatMap((other, k) =>
        image.includes(k) || other.role !== axis.role || other.spacing !== axis.spacing
          ? []
          : [1, -1].map((sign) => ({ image: [...image, k], signs: [...signs, sign] })),
      ),
    );
  return maps.map(({ image, signs }) =>
    axes.map((_, row) => axes.map((__, column) => (image[row] === column ? signs[row]! : 0))),
  );
}

function fieldActions(fields: readonly Field[]): PointElement['fields'][] {
  let actions: { field: number; sign: 1 | -1 }[][] = [[]];
  for (const field of fields) {
    actions = actions.flatMap((chosen) =>
      fields.flatMap((other, k) =>
        chosen.some((c) => c.field === k) || !sameValues(other, field)
          ? []
          : ([1, -1] as const).map((sign) => [...chosen, { field: k, sign }]),
      ),
    );
    if (actions.length > MOST_FIELD_ACTIONS)
      throw new LimitError(
        `${fields.length} fields have more than ${MOST_FIELD_ACTIONS} permutations with signs`,
      );
  }
  return actions;
}

const sameValues = (x: Field, y: Field): boolean =>
  x.values.kind === y.values.kind &&
  (x.values.kind === 'residue' ? x.values.modulus : 0) ===
    (y.values.kind === 'residue' ? y.values.modulus : 0);

const elementKey = ({ matrix, fields }: PointElement): string =>
  `${matrix.flat().join()}|${fields.map((f) => f.sign * (f.field + 1)).join()}`;

/** The element that acts as `before` and then as `after`. */
const composed = (after: PointElement, before: PointElement): PointElement => ({
  matrix: product(after.matrix, before.matrix),
  fields: before.fields.map(({ field, sign }) => {
    const image = after.fields[field]!;
    return { field: image.field, sign: image.sign === sign ? 1 : -1 };
  }),
});

/** Those members of a group of candidates that are symmetries, by key. The symmetries form a subgroup H: few tests find
 *  generators of it, and an element that is no symmetry rules out its whole coset of the part of H found by then. */
function subgroup(
  candidates: readonly PointElement[],
  isSymmetry: (element: PointElement) => boolean,
): ReadonlyMap<string, PointElement> {
  const chosen: PointElement[] = [];
  let members = new Map<string, PointElement>();
  const excluded = new Set<string>();
  for (const candidate of candidates) {
    const key = elementKey(candidate);
    if (members.has(key) || excluded.has(key)) continue;
    if (isSymmetry(candidate)) {
      chosen.push(candidate);
      members = closure(chosen);
    } else {
      excluded.add(key);
      for (const member of members.values()) excluded.add(elementKey(composed(candidate, member)));
    }
  }
  return members;
}

/** The finite group that some elements generate, by key. */
function closure(generators: readonly PointElement[]): Map<string, PointElement> {
  const found = new Map<string, PointElement>(generators.map((g) => [elementKey(g), g]));
  for (const element of found.values())
    for (const g of generators) {
      const next = composed(g, element);
      const key = elementKey(next);
      if (!found.has(key)) found.set(key, next);
    }
  return found;
}

/** Distinct space blocks of the elements. */
function spaceParts(elements: readonly PointElement[], space: readonly number[]): Matrix[] {
  const found = new Map<string, Matrix>();
  for (const { matrix } of elements) {
    const part = space.map((i) => space.map((k) => matrix[i]![k]!));
    found.set(JSON.stringify(part), part);
  }
  return [...found.values()];
}

const product = (x: Matrix, y: Matrix): number[][] =>
  x.map((row) => row.map((_, k) => row.reduce((sum, m, j) => sum + m * y[j]![k]!, 0)));

/** The group generated by some matrices, as keys. */
function generated(matrices: readonly Matrix[], dimension: number): Set<string> {
  const identity = Array.from({ length: dimension }, (_, i) =>
    Array.from({ length: dimension }, (__, k) => (i === k ? 1 : 0)),
  );
  const found = new Set([JSON.stringify(identity)]);
  const queue: Matrix[] = [identity];
  for (let m = queue.pop(); m; m = queue.pop())
    for (const g of matrices) {
      const next = product(m, g);
      const key = JSON.stringify(next);
      if (!found.has(key)) {
        found.add(key);
        queue.push(next);
      }
    }
  return found;
}

/** A generating set without superfluous elements, simplest elements first, in words. */
function generators(group: readonly Matrix[], names: readonly string[]): string[] {
  const moved = (m: Matrix): number => m.reduce((n, row, i) => n + (row[i] === 1 ? 0 : 1), 0);
  const negative = (m: Matrix): number => m.flat().filter((x) => x < 0).length;
  const first = (m: Matrix): number => m.findIndex((row, i) => row[i] !== 1);
  const sorted = [...group].sort(
    (x, y) => moved(x) - moved(y) || negative(x) - negative(y) || first(x) - first(y),
  );
  const chosen: Matrix[] = [];
  let size = 1;
  for (const m of sorted) {
    if (size === group.length) break;
    const larger = generated([...chosen, m], names.length).size;
    if (larger > size) {
      chosen.push(m);
      size = larger;
    }
  }
  for (const m of [...chosen].reverse()) {
    const others = chosen.filter((c) => c !== m);
    if (generated(others, names.length).size === size) chosen.splice(chosen.indexOf(m), 1);
  }
  return chosen.map((m) => elementText(m, names));
}

/** `x -> -x`, `x <-> y`, `(x, y) -> (y, -x)`. */
export function elementText(matrix: Matrix, names: readonly string[]): string {
  const moved = names.flatMap((_, i) => (matrix[i]![i] === 1 ? [] : [i]));
  if (moved.length === 0) return 'identity';
  const image = (i: number): string => {
    const k = matrix[i]!.findIndex((x) => x !== 0);
    return matrix[i]![k]! > 0 ? names[k]! : `-${names[k]}`;
  };
  const [i, k] = moved as [number, number];
  if (moved.length === 1) return `${names[i]} -> ${image(i)}`;
  if (moved.length === 2 && image(i) === names[k] && image(k) === names[i])
    return `${names[i]} <-> ${names[k]}`;
  return `(${moved.map((j) => names[j]).join(', ')}) -> (${moved.map(image).join(', ')})`;
}
