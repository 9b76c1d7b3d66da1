import { formatMoney } from '@shared/units/money';
import { escapeHtml } from '../escape-html';

export interface PayFault {
  field: 'number' | 'expiry' | 'code';
  message: string;
}

interface PayView {
  amountMinor: number;
  currency: string;
  itemName: string;
  cancelUrl: string | null;
  /** A test card that pays, filled in beforehand. */
  cardNumber: string;
  declinedNumber: string;
}

const style = `
:root{color-scheme:light;font:18px/1.5 system-ui,sans-serif;color:#1d2b22;background:#eef3ee}
body{margin:0}main{max-width:30rem;margin:2rem auto;padding:1.5rem;background:#fff;border:1px solid #c4d2c6;border-radius:4px}
.test{background:#fdf3c7;color:#4a3b00;padding:.6rem 1rem;text-align:center;margin:0}
h1{font-size:1.6rem;margin:0 0 .25rem}p{margin:.25rem 0 1rem}
label{display:block;font-weight:600;margin-top:.9rem}.hint{font-size:.9rem;color:#45544a;margin:0}
input{font:inherit;width:100%;box-sizing:border-box;padding:.6rem;border:2px solid #5d6f62;border-radius:4px}
.pair{display:grid;grid-template-columns:1fr 1fr;gap:1rem}
button,a.back{font:inherit;display:block;width:100%;box-sizing:border-box;text-align:center;padding:.75rem;border-radius:4px;margin-top:1rem;cursor:pointer}
button.pay{background:#1d5b33;color:#fff;border:2px solid #1d5b33;font-weight:700}
button.other{background:#fff;color:#1d2b22;border:2px solid #5d6f62}a.back{color:#1d4f7a}
:focus-visible{outline:3px solid #1d4f7a;outline-offset:2px}
fieldset{border:1px solid #c4d2c6;border-radius:4px;margin:2rem 0 0;padding:.25rem 1rem 1rem}
.alert{border-left:6px solid #a01c1c;background:#fdecec;padding:.75rem 1rem;margin:0 0 1rem}
.fault{color:#8c1515;font-weight:600;margin:.2rem 0 0}input[aria-invalid=true]{border-color:#a01c1c}`;

/** A whole page in the stand-in's own look; `body` is HTML already. */
function document(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1">
<title>${escapeHtml(title)}</title><style>${style}</style></head>
<body><header class="test">Test payment page on this machine. No money moves.</header><main>${body}</main></body>
</html>`;
}

/** The page with the card form, and beside each field what is wrong with it. */
export function payPage(view: PayView, faults: readonly PayFault[]): string {
  const amount = formatMoney(view.amountMinor, view.currency);
  const alert =
    faults.length === 0
      ? ''
      : `<div class="alert" role="alert"><strong>The payment was not made.</strong> ${faults
          .map(({ message }) => escapeHtml(message))
          .join(' ')}</div>`;
  const back =
    view.cancelUrl === null
      ? ''
      : `<a class="back" href="${escapeHtml(view.cancelUrl)}">Cancel and go back</a>`;
  return document(
    `${faults.length > 0 ? 'Not paid: ' : ''}Pay ${amount}`,
    `<h1>Pay ${escapeHtml(amount)}</h1><p>${escapeHtml(view.itemName)}</p>${alert}
<form method="post" novalidate>
${field('number', 'Card number', view.cardNumber, 'cc-number', faults, 'Filled in with a test card that pays.')}
<div class="pair"><div>${field('expiry', 'Expires (MM/YY)', '12/34', 'cc-exp', faults)}</div>
<div>${field('code', 'Security code', '123', 'cc-csc', faults)}</div></div>
<button class="pay" type="submit">Pay ${escapeHtml(amount)}</button>
<fieldset><legend>Try what can go wrong</legend>
<button class="other" type="submit" name="outcome" value="declined">Pay with a card that is declined (${escapeHtml(view.declinedNumber)})</button>
<button class="other" type="submit" name="outcome" value="poor">Pay with a card that has too little money</button>
</fieldset>
</form>${back}`,
  );
}

function field(
  name: PayFault['field'],
  label: string,
  value: string,
  autocomplete: string,
  faults: readonly PayFault[],
  hint = '',
): string {
  const fault = faults.find((entry) => entry.field === name);
  const described = [hint ? `${name}-hint` : '', fault ? `${name}-fault` : ''].filter(Boolean);
  return `<label for="${name}">${label}</label>
${hint ? `<p class="hint" id="${name}-hint">${hint}</p>` : ''}
<input id="${name}" name="${name}" value="${escapeHtml(value)}" inputmode="numeric" autocomplete="${autocomplete}"${
    described.length > 0 ? ` aria-describedby="${described.join(' ')}"` : ''
  }${fault ? ' aria-invalid="true"' : ''}>
${fault ? `<p class="fault" id="${name}-fault">${escapeHtml(fault.message)}</p>` : ''}`;
}

/** A page that says why there is nothing to pay, and the way back when there is one. */
export function errorPage(text: string, backUrl: string | null): string {
  const back = backUrl === null ? '' : `<a class="back" href="${escapeHtml(backUrl)}">Go back</a>`;
  return document(
    'Nothing to pay here',
    `<h1>Nothing to pay here</h1><p>${escapeHtml(text)}</p>${back}`,
  );
}
