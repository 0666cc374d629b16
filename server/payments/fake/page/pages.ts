import type { SessionDocument } from '../documents';
import { moneyText } from '../money';
import type { SessionNote } from '../state';
import { html } from './html';
import type { Html } from './html';
import { style } from './style';

function page(title: string, body: Html): string {
  return `<!doctype html>\n${
    html`<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title} · Test payment page</title>
<style>${{ html: style }}</style>
</head>
<body>
<header class="banner">Test payment page — no real money</header>
<main>
${body}
</main>
</body>
</html>`.html
  }\n`;
}

/** The page's own words for what pressing the button does. */
function wordsOf(session: SessionDocument, note: SessionNote): { heading: string; meaning: string; button: string } {
  if (session.mode === 'setup') {
    return { heading: 'Keep a card for later', meaning: 'Nothing is held or charged now.', button: 'Keep this card' };
  }
  const amount = moneyText(session.amount_total ?? 0, session.currency ?? 'usd');
  return note.captureMethod === 'manual'
    ? { heading: `Hold ${amount} on your card`, meaning: 'Held, not charged: the amount is set aside on your card.', button: `Hold ${amount}` }
    : { heading: `Pay ${amount}`, meaning: 'The amount is charged to your card now.', button: `Pay ${amount}` };
}

export function payPage(session: SessionDocument, note: SessionNote): string {
  const words = wordsOf(session, note);
  return page(
    words.heading,
    html`<h1>${words.heading}</h1>
${note.notice !== null && html`<p class="alert" role="alert" id="notice">${note.notice} Nothing was taken. You can try again.</p>`}
<section class="sheet" aria-label="What this is for">
<dl>
<dt>For</dt><dd>${note.item.name}${note.item.quantity > 1 && html` × ${note.item.quantity}`}</dd>
${note.item.description !== null && html`<dt>About</dt><dd>${note.item.description}</dd>`}
${session.amount_total !== null && html`<dt>Amount</dt><dd>${moneyText(session.amount_total, session.currency ?? 'usd')}</dd>`}
</dl>
${session.custom_text.submit === null && html`<p>${words.meaning}</p>`}
</section>
<form method="post" class="sheet" novalidate>
${emailField(session)}
<label for="card">Card number</label>
<p class="hint" id="card-hint">A test card, such as 4242 4242 4242 4242</p>
<input id="card" name="card" inputmode="numeric" autocomplete="off" required aria-describedby="card-hint${note.notice !== null && ' notice'}">
<div class="pair">
<div><label for="expiry">Expires (MM/YY)</label><input id="expiry" name="expiry" inputmode="numeric" autocomplete="off" placeholder="12 / 34" required></div>
<div><label for="cvc">Security code</label><input id="cvc" name="cvc" inputmode="numeric" autocomplete="off" placeholder="123" required></div>
</div>
${session.custom_text.submit !== null && html`<p>${session.custom_text.submit.message}</p>`}
<button type="submit">${words.button}</button>
${session.cancel_url !== null && html`<a class="button quiet" href="${session.cancel_url}">Cancel and go back</a>`}
</form>
${testCards()}`,
  );
}

function emailField(session: SessionDocument): Html {
  const known = session.customer_email;
  return known === null
    ? html`<label for="email">E-mail for the receipt</label><input id="email" name="email" type="email" autocomplete="email" required value="${session.customer_details?.email ?? ''}">`
    : html`<p>Receipt to ${known}</p>`;
}

const listed: readonly (readonly [string, string])[] = [
  ['4242 4242 4242 4242', 'works'],
  ['5555 5555 5555 4444', 'works (Mastercard)'],
  ['4000 0000 0000 0002', 'is declined'],
  ['4000 0000 0000 9995', 'is declined: not enough money'],
  ['4000 0000 0000 0069', 'is declined: card expired'],
  ['4000 0000 0000 0127', 'is declined: wrong security code'],
  ['4000 0027 6000 3184', 'asks you to approve at the bank'],
  ['4000 0000 0000 0259', 'is charged, then disputed'],
  ['4000 0000 0000 5126', 'is charged; a refund fails later'],
];

function testCards(): Html {
  return html`<details>
<summary>Test cards</summary>
<p class="hint">Any date to come and any three digits go with them. Real cards are never taken.</p>
<table><thead><tr><th scope="col">Number</th><th scope="col">What happens</th></tr></thead><tbody>
${listed.map(([number, effect]) => html`<tr><td>${number}</td><td>${effect}</td></tr>`)}
</tbody></table>
</details>`;
}

/** The step at the student's bank, for cards that ask. */
export function bankPage(session: SessionDocument, note: SessionNote): string {
  const { heading } = wordsOf(session, note);
  return page(
    'Is it you?',
    html`<h1>Your bank asks: is it you?</h1>
<section class="sheet">
<p>${heading}, for “${note.item.name}”.</p>
<form method="post">
<button type="submit" name="answer" value="approve">Approve</button>
<button type="submit" name="answer" value="refuse" class="quiet">Refuse</button>
</form>
</section>`,
  );
}

/** A page with one thing to say and one way on. */
export function messagePage(heading: string, text: string, link: { href: string; words: string } | null = null): string {
  return page(
    heading,
    html`<h1>${heading}</h1>
<section class="sheet"><p>${text}</p>${link !== null && html`<a class="button" href="${link.href}">${link.words}</a>`}</section>`,
  );
}
