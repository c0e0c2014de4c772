// Options that several commands share.

/** Options of every command that prints results. */
export interface OutputOptions {
  readonly format: 'text' | 'json' | 'markdown';
  readonly out?: string;
  readonly quiet: boolean;
  readonly colour: boolean;
}

/** Options of the commands that run a check. */
export interface CheckOptions extends OutputOptions {
  readonly rules: readonly string[];
}
