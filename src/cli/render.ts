// A document in the format that was asked for; each format is loaded only when it is used.

import type { Block } from '../report/document.ts';
import type { OutputOptions } from './options.ts';
import { mayColour } from './output.ts';

/** The document as text or Markdown. JSON is not made from documents but from the report data. */
export async function renderDocument(document: readonly Block[], options: OutputOptions): Promise<string> {
  if (options.format === 'markdown') {
    const { renderMarkdown } = await import('../report/markdown.ts');
    return renderMarkdown(document);
  }
  const { renderText } = await import('../report/text.ts');
  return renderText(document, { colour: mayColour(options) });
}
