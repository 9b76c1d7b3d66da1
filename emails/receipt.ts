import { formatMoney } from '@shared/units/money';
import { cleanText, webAddress } from './clean-text';
import { defineTemplate, type Letter } from './template';
import { dateInWords } from './when';

export interface ReceiptProps extends Letter {
  receiptNumber: string;
  /** Integer minor units, with its ISO 4217 code. */
  amountMinor: number;
  currency: string;
  /** Instant in ISO 8601. */
  paidAt: string;
  timeZone: string;
  /** Where payments are seen. */
  link: string;
}

/** Tells that a payment was received. */
export const receipt = defineTemplate<ReceiptProps>({
  subject: 'Your receipt',
  heading: 'Your receipt',
  blocks: [
    { kind: 'paragraph', text: 'Thank you. We have received your payment.' },
    {
      kind: 'facts',
      rows: [
        { label: 'Amount paid', lines: 'amount' },
        { label: 'Paid on', lines: 'date' },
        { label: 'Receipt number', lines: 'number' },
      ],
    },
    { kind: 'button', label: 'See your payments', address: 'link' },
  ],
  view: (props) => ({
    amount: [formatMoney(props.amountMinor, props.currency)],
    date: [dateInWords(props.paidAt, props.timeZone)],
    number: [cleanText(props.receiptNumber)],
    link: webAddress(props.link),
  }),
});
