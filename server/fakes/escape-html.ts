import Handlebars from 'handlebars';

/** Text made safe for HTML content and for quoted attributes. */
export const escapeHtml = (text: string): string => Handlebars.escapeExpression(text);
