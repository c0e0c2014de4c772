// The only room that loads KaTeX: every formula that goes into a Markdown report is set once by it and refused when it
// does not set without complaint, so that nobody pastes a formula that shows as red source.

/** Longest formula that is tried; KaTeX takes seconds beyond tens of thousands of symbols. */
const LONGEST = 4000;
/** Deepest nesting of braces that is tried; KaTeX recurses. */
const DEEPEST = 100;

function nesting(latex: string): number {
  let depth = 0;
  let deepest = 0;
  for (const c of latex) {
    if (c === '{') deepest = Math.max(deepest, ++depth);
    else if (c === '}') depth--;
  }
  return deepest;
}

/** A command that needs trust (links, classes, images) is an error; `trust: false` would set it as red source. */
const refuse = (): boolean => {
  throw new Error('a command that needs trust');
};

/** Loads KaTeX and returns the check: true when the formula sets without an error or a warning. */
export async function loadDisplayCheck(): Promise<(latex: string) => boolean> {
  const katex = (await import('katex')).default;
  return (latex) => {
    if (latex.trim() === '' || latex.length > LONGEST || nesting(latex) > DEEPEST) return false;
    try {
      katex.renderToString(latex, { throwOnError: true, strict: 'error', trust: refuse, maxExpand: 100 });
      return true;
    } catch {
      return false;
    }
  };
}
