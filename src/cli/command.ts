// The command line: commands, options, help. Every command loads its own file when it runs, so that help stays fast.

import { Command, CommanderError, InvalidArgumentError, Option } from 'commander';
import { visible } from '../report/escape.ts';
import { version } from '../report/version.ts';
import { EXIT, guarded } from './exitCodes.ts';
import type { CheckOptions, OutputOptions } from './options.ts';
import type { SectionOptions } from './section.ts';

const EXIT_CODES = `
Exit codes:
  0   every claim holds, or nothing is claimed (undecided claims are shown, and do not fail)
  1   a claim fails, the proposal does not match, or a fault was found
  2   the input or the command line is wrong
  3   a stated limit was hit
  70  a bug in saltus`;

const example = (...lines: string[]): string => `\nExample:\n${lines.map((line) => `  ${line}`).join('\n')}`;

const collect = (folder: string, before: readonly string[]): string[] => [...before, folder];

function filePath(value: string): string {
  if (value === '') throw new InvalidArgumentError('It is empty; give the name of a file.');
  return value;
}

function withOutput(command: Command, formats: readonly string[]): Command {
  return command
    .addOption(new Option('--format <format>', 'form of the result').choices(formats).default('text'))
    .option('--out <file>', 'write the result to a file instead of standard output', filePath)
    .option('--quiet', 'no progress; as text, only what needs attention', false)
    .option('--no-colour', 'no colours (NO_COLOR is respected too)');
}

function withRules(command: Command): Command {
  return command.option('--rules <folder>', 'a folder with further rules; may be repeated', collect, []);
}

const ALL_FORMATS = ['text', 'json', 'markdown'] as const;
const CASE = 'case file, or - for standard input';

/** The program with all its commands; `done` receives the exit code of the command that ran. */
function program(done: (code: number) => void): Command {
  const root = new Command('saltus')
    .description(
      'Checks whether a continuum action is the a → 0 limit of a lattice model when the fields may jump.',
    )
    .version(version, '-V, --version', 'print the version')
    .helpOption('-h, --help', 'show help')
    .helpCommand('help [command]', 'show help for a command')
    .addHelpText(
      'after',
      `${example('saltus new sheet --out sheet.yaml', 'saltus check sheet.yaml')}\n${EXIT_CODES}`,
    );

  withRules(withOutput(root.command('check').argument('<case...>', CASE), ALL_FORMATS))
    .description('check everything, with a verdict for each claim')
    .addHelpText(
      'after',
      example('saltus check sheet.yaml', 'saltus check --format markdown --out sheet.md sheet.yaml') +
        `\n${EXIT_CODES}`,
    )
    .action(async (files: string[], options: CheckOptions) => {
      done(await guarded(async () => (await import('./check.ts')).check(files, options)));
    });

  const section = (name: 'expand' | 'symmetries' | 'configurations', description: string): Command => {
    const key = name === 'expand' ? 'expansion' : name;
    return withRules(withOutput(root.command(name).argument('<case>', CASE), ALL_FORMATS))
      .description(description)
      .action(async (file: string, options: SectionOptions) => {
        done(await guarded(async () => (await import('./section.ts')).printSection(key, file, options)));
      });
  };
  section('expand', 'expand the lattice action in the spacings, modulo total derivatives')
    .option('--raw', 'also show the series before total derivatives are dropped')
    .option('--second-opinion', 'compare the Taylor coefficients with those of an independent algebra system')
    .addHelpText(
      'after',
      example('saltus expand sheet.yaml', 'saltus expand --raw --second-opinion sheet.yaml'),
    );
  section(
    'symmetries',
    'list shift symmetries and the point group, on the lattice and in the continuum',
  ).addHelpText('after', example('saltus symmetries sheet.yaml'));
  section('configurations', 'list rough configurations and how their action scales').addHelpText(
    'after',
    example('saltus configurations --format json sheet.yaml'),
  );

  const rules = withRules(withOutput(root.command('rules'), ['text', 'json']))
    .description('list the rules, explain one, or list the facts that rules may use')
    .argument('[what]', 'explain or facts')
    .argument('[id]', 'the rule to explain')
    .addHelpText(
      'after',
      example('saltus rules', 'saltus rules explain series-does-not-truncate', 'saltus rules facts'),
    );
  rules.action(async (what: string | undefined, id: string | undefined, options: CheckOptions) => {
    done(await guarded(async () => (await import('./rules.ts')).rules(what, id, options)));
  });

  root
    .command('schema')
    .description('print the JSON Schema of case files')
    .option('--out <file>', 'write it to a file instead of standard output', filePath)
    .addHelpText('after', example('saltus schema --out case.schema.json'))
    .action(async (options: Pick<OutputOptions, 'out'>) => {
      done(await guarded(async () => (await import('./schema.ts')).schema(options)));
    });

  root
    .command('new')
    .argument('<name>', 'identifier of the case: a-z, 0-9 and -')
    .description('print a starter case to edit')
    .option('--out <file>', 'write it to a file instead of standard output', filePath)
    .addHelpText('after', example('saltus new sheet --out sheet.yaml', 'saltus new sheet | saltus check -'))
    .action(async (name: string, options: Pick<OutputOptions, 'out'>) => {
      done(await guarded(async () => (await import('./new.ts')).newCase(name, options)));
    });

  return root;
}

function prepare(command: Command): void {
  command.exitOverride().configureOutput({
    writeErr: (text) => process.stderr.write(text.split('\n').map(visible).join('\n')),
  });
  for (const child of command.commands) prepare(child);
}

/** Runs one command line (without node and script). Returns the exit code; throws nothing. */
export async function runCommand(args: readonly string[]): Promise<number> {
  let code: number = EXIT.ok;
  const root = program((c) => {
    code = c;
  });
  prepare(root);
  // --no-color is read as --no-colour.
  const spelled = args.map((arg) => (arg === '--no-color' ? '--no-colour' : arg));
  try {
    await root.parseAsync(spelled, { from: 'user' });
  } catch (error) {
    if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.ok : EXIT.input;
    return guarded(() => Promise.reject(error));
  }
  return code;
}
