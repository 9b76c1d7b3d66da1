import Handlebars from 'handlebars';
import { cleanText } from './clean-text';
import { layout, type Block } from './layout';
import { plainText } from './plain-text';

export interface RenderedEmail {
  /** One line. */
  subject: string;
  text: string;
  html: string;
}

/** Who a message is from and to; every template shows these. */
export interface Letter {
  /** Null greets without a name. */
  firstName: string | null;
  sender: Sender;
}

/** A neutral name: what kind of care it is must not show in an inbox. */
export interface Sender {
  name: string;
  /** Where a person answers; null when there is none. */
  phone: string | null;
}

/** What a template's placeholders become: lines of text, or null where there is nothing to show. */
type View = Record<string, string | string[] | null>;

export interface TemplateSource<Props> {
  /** Subject and the page's title; placeholders in double braces, as everywhere below. */
  subject: string;
  heading: string;
  blocks: readonly Block[];
  view(props: Props): View;
}

export interface Template<Props> {
  render(props: Props): Promise<RenderedEmail>;
}

interface Compiled {
  subject: Handlebars.TemplateDelegate<View>;
  text: Handlebars.TemplateDelegate<View>;
  html: Handlebars.TemplateDelegate<View>;
}

/**
 * Makes a template of one list of blocks, from which both the HTML and the text are made. It is
 * compiled at its first use and kept.
 */
export function defineTemplate<Props extends Letter>(
  source: TemplateSource<Props>,
): Template<Props> {
  let compiled: Promise<Compiled> | null = null;
  return {
    async render(props) {
      compiled ??= compile(source);
      const { subject, text, html } = await compiled;
      const view: View = {
        ...source.view(props),
        firstName: props.firstName === null ? null : cleanText(props.firstName) || null,
        senderName: cleanText(props.sender.name),
        senderPhone: props.sender.phone === null ? null : cleanText(props.sender.phone),
      };
      const subjectLine = cleanText(subject(view));
      return {
        subject: subjectLine,
        text: text(view),
        html: html({ ...view, subjectLine }),
      };
    },
  };
}

async function compile<Props>(source: TemplateSource<Props>): Promise<Compiled> {
  // Loaded at first use: it is large, and a server that sends nothing has no need of it.
  const { default: mjml2html } = await import('mjml');
  // `fonts: {}` keeps MJML from linking a font at another host by itself.
  const { html } = await mjml2html(layout(source.heading, source.blocks), {
    fonts: {},
    keepComments: false,
    validationLevel: 'strict',
  });
  const plain = { strict: true, noEscape: true };
  return {
    subject: Handlebars.compile(source.subject, plain),
    text: Handlebars.compile(plainText(source.heading, source.blocks), plain),
    html: Handlebars.compile(html, { strict: true }),
  };
}
