import type { DocketBlock } from './docket.js';

/** Ink on paper, one column, nothing fetched; a table breaks between rows where a page ends. */
const STYLE = `body{font:15px/1.5 Georgia,serif;color:#222;background:#fff;max-width:72rem;margin:2rem auto;padding:0 1rem}
h1{font-size:1.4rem}h2{font-size:1.1rem;margin-top:2rem}
table{border-collapse:collapse;width:100%;font-size:.85rem}th,td{text-align:left;vertical-align:top;padding:.3rem .6rem .3rem 0;border-bottom:1px solid #bbb}
td:nth-child(2){overflow-wrap:anywhere}.short{white-space:nowrap}tr{break-inside:avoid}code{overflow-wrap:anywhere}
.caution{border-left:3px double #8a4b2a;padding-left:.8rem}svg{width:14rem;height:4rem;display:block}
@media print{body{margin:0;max-width:none}}`;

/** A docket as one printable page that stands by itself. */
export function docketHtml(blocks: readonly DocketBlock[]): string {
  const title = blocks[0]?.kind === 'heading' ? blocks[0].text : 'Docket';
  const body = blocks.map((block, i) => htmlOf(block, i === 0 ? 'h1' : 'h2')).join('\n');
  return `<!doctype html>
<html lang="en">
<meta charset="utf-8">
<meta name="viewport" content="width=device-width">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">
<title>Docket: ${escaped(title)}</title>
<style>${STYLE}</style>
<main>
${body}
</main>
</html>
`;
}

function htmlOf(block: DocketBlock, heading: 'h1' | 'h2'): string {
  switch (block.kind) {
    case 'heading':
      return `<${heading}>${escaped(block.text)}</${heading}>`;
    case 'paragraph':
      return `<p>${escaped(block.text)}</p>`;
    case 'caution':
      return `<p class="caution">${escaped(block.text)}</p>`;
    case 'code':
      return `<p><code>${escaped(block.text)}</code></p>`;
    case 'list': {
      const name = block.ordered ? 'ol' : 'ul';
      const items = block.items.map(({ text, struck }) =>
        struck ? `<li><s>${escaped(text)}</s></li>` : `<li>${escaped(text)}</li>`,
      );
      return `<${name}>${items.join('')}</${name}>`;
    }
    default:
      return tableOf(block);
  }
}

function tableOf({ head, rows, short = [], pictures }: Extract<DocketBlock, { kind: 'table' }>): string {
  const heads = [...head, ...(pictures ? ['half a second on either side'] : [])];
  const lines = rows.map((row, i) => {
    const cells = row
      .map((cell, at) => `<td${short.includes(at) ? ' class="short"' : ''}>${escaped(cell)}</td>`)
      .join('');
    return `<tr>${cells}${pictures ? `<td>${pictures[i] ?? ''}</td>` : ''}</tr>`;
  });
  return `<table><thead><tr>${heads.map((cell) => `<th scope="col">${escaped(cell)}</th>`).join('')}</tr></thead><tbody>\n${lines.join('\n')}\n</tbody></table>`;
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text in HTML, and in quoted attributes of it. */
function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (letter) => ENTITIES[letter] ?? letter);
}
