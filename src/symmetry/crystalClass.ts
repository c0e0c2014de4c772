// Hermann–Mauguin names of crystallographic point groups from the kinds of their elements: the counts of rotations and
// rotoinversions by order tell the 2 + 10 + 32 classes in one, two and three dimensions apart (International Tables for
// Crystallography, vol. A; the table of counts is from memory and checked against generated groups in the tests).

type Matrix = readonly (readonly number[])[];

/** Counts of [-6, -4, -3, m, -1, 1, 2, 3, 4, 6] in each class. */
const CLASSES: ReadonlyMap<string, string> = new Map(
  Object.entries({
    '1': '0 0 0 0 0 1 0 0 0 0',
    '-1': '0 0 0 0 1 1 0 0 0 0',
    '2': '0 0 0 0 0 1 1 0 0 0',
    m: '0 0 0 1 0 1 0 0 0 0',
    '2/m': '0 0 0 1 1 1 1 0 0 0',
    '222': '0 0 0 0 0 1 3 0 0 0',
    mm2: '0 0 0 2 0 1 1 0 0 0',
    mmm: '0 0 0 3 1 1 3 0 0 0',
    '4': '0 0 0 0 0 1 1 0 2 0',
    '-4': '0 2 0 0 0 1 1 0 0 0',
    '4/m': '0 2 0 1 1 1 1 0 2 0',
    '422': '0 0 0 0 0 1 5 0 2 0',
    '4mm': '0 0 0 4 0 1 1 0 2 0',
    '-42m': '0 2 0 2 0 1 3 0 0 0',
    '4/mmm': '0 2 0 5 1 1 5 0 2 0',
    '3': '0 0 0 0 0 1 0 2 0 0',
    '-3': '0 0 2 0 1 1 0 2 0 0',
    '32': '0 0 0 0 0 1 3 2 0 0',
    '3m': '0 0 0 3 0 1 0 2 0 0',
    '-3m': '0 0 2 3 1 1 3 2 0 0',
    '6': '0 0 0 0 0 1 1 2 0 2',
    '-6': '2 0 0 1 0 1 0 2 0 0',
    '6/m': '2 0 2 1 1 1 1 2 0 2',
    '622': '0 0 0 0 0 1 7 2 0 2',
    '6mm': '0 0 0 6 0 1 1 2 0 2',
    '-6m2': '2 0 0 4 0 1 3 2 0 0',
    '6/mmm': '2 0 2 7 1 1 7 2 0 2',
    '23': '0 0 0 0 0 1 3 8 0 0',
    'm-3': '0 0 8 3 1 1 3 8 0 0',
    '432': '0 0 0 0 0 1 9 8 6 0',
    '-43m': '0 6 0 6 0 1 3 8 0 0',
    'm-3m': '0 6 8 9 1 1 9 8 6 0',
  }).map(([name, counts]) => [counts, name]),
);

/** Position in the counts by determinant and trace of a 3×3 matrix. */
const KIND: ReadonlyMap<string, number> = new Map([
  ['-1,-2', 0],
  ['-1,-1', 1],
  ['-1,0', 2],
  ['-1,1', 3],
  ['-1,-3', 4],
  ['1,3', 5],
  ['1,-1', 6],
  ['1,0', 7],
  ['1,1', 8],
  ['1,2', 9],
]);

function determinant(m: Matrix): number {
  if (m.length === 0) return 1;
  return m[0]!.reduce((sum, x, k) => {
    if (x === 0) return sum;
    const minor = m.slice(1).map((row) => row.filter((_, j) => j !== k));
    return sum + (k % 2 === 0 ? 1 : -1) * x * determinant(minor);
  }, 0);
}

const trace = (m: Matrix): number => m.reduce((sum, row, k) => sum + row[k]!, 0);

/** Name of a finite group of integer matrices in one to three dimensions; undefined in four or for no known class. */
export function crystalClass(elements: readonly Matrix[]): string | undefined {
  const dimension = elements[0]?.length ?? 0;
  if (dimension === 1) return elements.length === 1 ? '1' : 'm';
  if (dimension === 2) {
    const rotations = elements.filter((m) => determinant(m) === 1).length;
    const hasMirrors = rotations < elements.length;
    if (!hasMirrors) return `${rotations}`;
    return ['m', '2mm', '3m', '4mm', '', '6mm'][rotations - 1] || undefined;
  }
  if (dimension !== 3) return undefined;
  const counts = new Array<number>(10).fill(0);
  for (const m of elements) {
    const kind = KIND.get(`${determinant(m)},${trace(m)}`);
    if (kind === undefined) return undefined;
    counts[kind]!++;
  }
  return CLASSES.get(counts.join(' '));
}
