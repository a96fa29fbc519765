/** A table of GitHub-flavoured Markdown; cells are text as it is. */
export function markdownTable([head = [], ...rows]: readonly (readonly string[])[]): string {
  return [row(head), `|${' --- |'.repeat(head.length)}`, ...rows.map(row)].join('\n');
}

function row(cells: readonly string[]): string {
  return `| ${cells.map(escapedMarkdown).join(' | ')} |`;
}

/** Text as it is: nothing in it is read as Markdown or HTML, and it stays on one line (CommonMark 0.31, "Backslash escapes"). */
export function escapedMarkdown(text: string): string {
  return text.replace(/[\r\n\t\f\v\u2028\u2029]+/g, ' ').replace(/[\\`*_[\]<>|&#~!]/g, '\\$&');
}
