import type { Block, Letter } from './letter';

/** The plain-text part: the same words in the same order as the HTML. */
export function renderText(letter: Letter): string {
  const parts = [letter.heading, ...letter.blocks.map(blockText)];
  if (letter.action) parts.push(`${letter.action.label}:\n${letter.action.url}`);
  parts.push(`-- \n${letter.sender}`);
  return `${parts.join('\n\n')}\n`;
}

function blockText(block: Block): string {
  if (block.kind === 'paragraph') return block.text;
  if (block.kind === 'list') return block.items.map((item) => `- ${item}`).join('\n');
  return block.rows.map(([name, value]) => `${name}: ${value}`).join('\n');
}
