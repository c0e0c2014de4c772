// Where the rules that come with the program are, whether it runs from its sources or from a bundle.

import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder `rules/` beside the package.json of this program. */
export function shippedRules(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'package.json'))) {
    const parent = dirname(folder);
    if (parent === folder)
      throw new Error('the installation of saltus is incomplete: its package.json is missing');
    folder = parent;
  }
  return join(folder, 'rules');
}
