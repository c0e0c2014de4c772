// Builds dist/: the program and the library as ES modules that share chunks, the types, and the licences of what is
// bundled (--outdir FOLDER elsewhere than dist/; --no-types without the types). Heavy libraries stay in chunks of their own, because they are imported dynamically where they are used.

import { execFileSync } from 'node:child_process';
import { chmodSync, existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { build } from 'esbuild';

const { values: options } = parseArgs({
  options: { outdir: { type: 'string', default: 'dist' }, 'no-types': { type: 'boolean', default: false } },
});
const { outdir } = options;
const { version } = JSON.parse(readFileSync('package.json', 'utf8'));

/** Packages whose code went into the bundle, from the paths of its inputs. */
function bundledPackages(metafile) {
  const folders = new Set();
  for (const input of Object.keys(metafile.inputs)) {
    const found = /^(.*node_modules\/(?:@[^/]+\/)?[^/]+)\//.exec(input);
    if (found) folders.add(found[1]);
  }
  return [...folders].sort();
}

/** Name, version and licence text of every bundled package. */
function licences(folders) {
  return folders.map((folder) => {
    const { name, version, license } = JSON.parse(readFileSync(`${folder}/package.json`, 'utf8'));
    const texts = readdirSync(folder)
      .filter((file) => /^(licen[cs]e|notice)/i.test(file))
      .map((file) => readFileSync(`${folder}/${file}`, 'utf8').trim());
    return `${name} ${version} (${license})\n\n${texts.join('\n\n')}\n`;
  });
}

rmSync(outdir, { recursive: true, force: true });
const { metafile } = await build({
  entryPoints: { saltus: 'src/cli/main.ts', index: 'src/index.ts' },
  outdir,
  bundle: true,
  splitting: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  minify: true,
  chunkNames: 'chunks/[name]-[hash]',
  legalComments: 'none',
  metafile: true,
  define: { SALTUS_VERSION: JSON.stringify(version) },
  // Packages in the older module format call require for modules of Node itself.
  banner: { js: "import{createRequire}from'node:module';const require=createRequire(import.meta.url);" },
  logLevel: 'warning',
});
chmodSync(`${outdir}/saltus.js`, 0o755);

const rule = `\n${'-'.repeat(80)}\n\n`;
const packages = bundledPackages(metafile);
writeFileSync(
  `${outdir}/LICENCES.txt`,
  `Licences of the packages bundled with saltus.\n${rule}${licences(packages).join(rule)}`,
);

if (!options['no-types']) {
  execFileSync(
    process.execPath,
    ['node_modules/typescript/bin/tsc', '-p', '.tsconfig.types.json', '--outDir', `${outdir}/types`],
    {
      stdio: 'inherit',
    },
  );
  if (!existsSync(`${outdir}/types/index.d.ts`)) throw new Error('the types were not written');
}
