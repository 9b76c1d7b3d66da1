import type { Block } from './layout';

/** The text part of a message, from the same blocks as its HTML. */
export function plainText(heading: string, blocks: readonly Block[]): string {
  return `${heading}

Hello{{#if firstName}} {{firstName}}{{/if}},

${blocks.map(blockText).join('')}--
{{senderName}} sent you this message. Nobody reads answers to it.
{{#if senderPhone}}
Questions? Call {{senderPhone}}.
{{/if}}
`;
}

function blockText(block: Block): string {
  const body = `${bodyText(block)}\n\n`;
  return block.only === undefined ? body : `{{#if ${block.only}}}\n${body}{{/if}}\n`;
}

function bodyText(block: Block): string {
  switch (block.kind) {
    case 'paragraph':
      return block.text;
    case 'facts':
      return block.rows
        .map(({ label, lines }) => `${label}:\n{{#each ${lines}}}\n  {{this}}\n{{/each}}`)
        .join('\n');
    case 'button':
    case 'link':
      return `${block.label}:\n{{${block.address}}}`;
  }
}
