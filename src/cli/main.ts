#!/usr/bin/env node
// The program `saltus`. Only `--version` is answered here, before anything else is loaded; the rest is behind one
// dynamic import. Ctrl-C keeps its default action: the process ends at once even in the middle of a long computation
// (a shell reports 130), and files are written so that an old one stays whole.

import { version } from '../report/version.ts';

const args = process.argv.slice(2);

if (args.length === 1 && (args[0] === '--version' || args[0] === '-V')) process.stdout.write(`${version}\n`);
else {
  // A reader that closes the pipe early (`saltus check … | head`) ends the run quietly, with the code already known.
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EPIPE') process.exit();
    process.stderr.write(`saltus: cannot write to standard output: ${error.code ?? error.message}\n`);
    process.exit(2);
  });
  const { runCommand } = await import('./command.ts');
  process.exitCode = await runCommand(args);
}
