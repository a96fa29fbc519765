import { escapedMarkdown, markdownTable } from '../reporters/markdown-text.js';
import type { DocketBlock } from './docket.js';

/** A docket as GitHub-flavoured Markdown, without its drawings. */
export function docketMarkdown(blocks: readonly DocketBlock[]): string {
  return blocks.map((block, i) => `${markdownOf(block, i === 0 ? '#' : '##')}\n`).join('\n');
}

function markdownOf(block: DocketBlock, mark: string): string {
  switch (block.kind) {
    case 'heading':
      return `${mark} ${escapedMarkdown(block.text)}`;
    case 'paragraph':
      return escapedMarkdown(block.text);
    case 'caution':
      return `> ${escapedMarkdown(block.text)}`;
    case 'code':
      return `    ${block.text.replace(/[\r\n]+/g, ' ')}`;
    case 'list':
      return block.items
        .map(({ text, struck }, i) => {
          const sign = block.ordered ? `${i + 1}.` : '-';
          return struck ? `${sign} ~~${escapedMarkdown(text)}~~` : `${sign} ${escapedMarkdown(text)}`;
        })
        .join('\n');
    default:
      return markdownTable([block.head, ...block.rows]);
  }
}
