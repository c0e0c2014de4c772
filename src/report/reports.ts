// The whole report of one case in one call, for library users.

import type { CheckReport } from './findings.ts';
import { renderMarkdown } from './markdown.ts';
import { reportDocument } from './sections.ts';
import { renderText, type TextStyle } from './text.ts';

/** The report for a terminal; without colour and 80 columns wide unless the style says otherwise. */
export function textReport(report: CheckReport, style: TextStyle = { colour: false }): string {
  return renderText(reportDocument(report), style);
}

/** The report in Markdown; loads KaTeX on first use. */
export function markdownReport(report: CheckReport): Promise<string> {
  return renderMarkdown(reportDocument(report));
}
