/** A part of a message. Texts may hold placeholders; `only` names one without which it is left out. */
export type Block = { only?: string } & (
  | { kind: 'paragraph'; text: string }
  /** Labels with one line or more each; `lines` names a placeholder that is a list. */
  | { kind: 'facts'; rows: readonly { label: string; lines: string }[] }
  /** The one thing to do; `address` names a placeholder. */
  | { kind: 'button'; label: string; address: string }
  | { kind: 'link'; label: string; address: string }
);

const ink = '#16233B';
const chalk = '#FAF7F0';
const oxide = '#A8432F';
const muted = '#5A6270';

/** The MJML of a message; MJML leaves the placeholders alone. */
export function layout(heading: string, blocks: readonly Block[]): string {
  return `<mjml lang="en" dir="ltr">
<mj-head>
<mj-title>{{subjectLine}}</mj-title>
<mj-attributes>
<mj-all font-family="Lato, 'Segoe UI', Helvetica, Arial, sans-serif" />
<mj-text color="${ink}" font-size="18px" line-height="1.5" padding="8px 28px" />
<mj-button background-color="${ink}" color="#FFFFFF" font-size="18px" font-weight="700" border-radius="8px" inner-padding="16px 28px" align="left" padding="16px 28px" />
</mj-attributes>
<mj-style>
h1 { font-size: 27px; line-height: 1.25; font-weight: 900; margin: 8px 0; }
p { margin: 0; } dl { margin: 0 0 8px; } dt { font-weight: 700; margin-top: 10px; } dd { margin: 0; }
a { color: ${ink}; } * { overflow-wrap: anywhere; }
</mj-style>
</mj-head>
<mj-body background-color="${chalk}">
<mj-section background-color="${ink}" border-bottom="4px solid ${oxide}" padding="4px 0">
<mj-column><mj-text color="#FFFFFF" font-weight="700">{{senderName}}</mj-text></mj-column>
</mj-section>
<mj-section background-color="#FFFFFF" padding="12px 0 20px">
<mj-column>
<mj-text><h1>${heading}</h1></mj-text>
${greeting}
${blocks.map(blockMjml).join('\n')}
</mj-column>
</mj-section>
<mj-section padding="12px 0">
<mj-column><mj-text color="${muted}" font-size="16px">${footer}</mj-text></mj-column>
</mj-section>
</mj-body>
</mjml>`;
}

const greeting = '<mj-text><p>Hello{{#if firstName}} {{firstName}}{{/if}},</p></mj-text>';

const footer = `<p>{{senderName}} sent you this message. Nobody reads answers to it.</p>
{{#if senderPhone}}<p>Questions? Call {{senderPhone}}.</p>{{/if}}`;

function blockMjml(block: Block): string {
  const body = bodyMjml(block);
  if (block.only === undefined) return body;
  return `<mj-raw>{{#if ${block.only}}}</mj-raw>${body}<mj-raw>{{/if}}</mj-raw>`;
}

function bodyMjml(block: Block): string {
  switch (block.kind) {
    case 'paragraph':
      return `<mj-text><p>${block.text}</p></mj-text>`;
    case 'facts':
      return `<mj-text><dl>${block.rows
        .map(({ label, lines }) => `<dt>${label}</dt>{{#each ${lines}}}<dd>{{this}}</dd>{{/each}}`)
        .join('')}</dl></mj-text>`;
    case 'button':
      return `<mj-button href="{{${block.address}}}">${block.label}</mj-button>`;
    case 'link':
      return `<mj-text><p><a href="{{${block.address}}}">${block.label}</a></p></mj-text>`;
  }
}
