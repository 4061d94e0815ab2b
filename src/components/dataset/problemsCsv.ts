import { csvFormatRows } from 'd3';
import type { Issue } from '#contract/problems';

/** A cell that a spreadsheet would take for a formula is led by an apostrophe. */
const defused = (text: string): string => (/^[=+\-@\t\r]/.test(text) ? `'${text}` : text);

/** @returns the problems of a wrong upload as CSV: file, line, column, problem; CRLF line ends. */
export function problemsCsv(issues: readonly Issue[]): string {
  const rows = issues.map(({ file, line, field, message }) => [
    file ?? '',
    line === undefined ? '' : String(line),
    defused(field ?? ''),
    defused(message),
  ]);
  return csvFormatRows([['file', 'line', 'column', 'problem'], ...rows]).replaceAll('\n', '\r\n');
}
