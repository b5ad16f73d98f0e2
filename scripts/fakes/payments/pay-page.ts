import type Stripe from 'stripe'
import { fakeFacts } from './sessions'

const escape = (text: string) => text.replace(/[&<>"']/g, character => `&#${character.charCodeAt(0)};`)

const STYLE = 'body{font:16px/1.5 "IBM Plex Sans",system-ui,sans-serif;background:#f6f4ee;color:#17212b;margin:0;display:grid;place-items:center;min-height:100vh}main{background:#fffefb;border:1px solid #b9b3a4;border-radius:4px;padding:2rem;width:min(26rem,90vw)}h1{font-size:1.3rem;margin:0}p.amount{font:600 1.8rem "IBM Plex Mono",ui-monospace,monospace;margin:.5rem 0 1.5rem}form{display:grid;gap:.6rem}button,a{font:inherit;padding:.7rem 1rem;border-radius:4px;border:1px solid #b9b3a4;background:#fffefb;color:#17212b;text-align:left;text-decoration:none;cursor:pointer}button.first{background:#122f57;color:#fffefb;border-color:#122f57}small{color:#5a6772}[role=alert]{color:#a5302a}'

function page(title: string, body: string): string {
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><title>${escape(title)}</title><style>${STYLE}</style></head><body><main>${body}</main></body></html>`
}

/** The hosted page of a session: plain HTML, each button a choice of the payer. */
export function renderPayPage(session: Stripe.Checkout.Session, refusal = ''): string {
  if (session.status !== 'open') return page('Payment over', `<h1>This payment is ${session.status === 'complete' ? 'done' : 'over'}</h1><p>Go back to the facility's page.</p>`)
  const amount = ((session.amount_total ?? 0) / 100).toFixed(2)
  return page('Local payment fake', `
    <small>Local payment fake: no money moves</small>
    <h1>${escape(fakeFacts(session).title)}</h1>
    <p class="amount">${escape((session.currency ?? '').toUpperCase())} ${amount}</p>
    ${refusal ? `<p role="alert">${escape(refusal)}</p>` : ''}
    <form method="post">
      <button class="first" name="do" value="pay">Pay by card</button>
      <button name="do" value="challenge">Pay by a card whose bank asks to confirm</button>
      <button name="do" value="decline">Pay by a card that is declined</button>
      ${session.cancel_url ? `<a href="${escape(session.cancel_url)}">Leave without paying</a>` : ''}
    </form>`)
}

/** The bank's page of a card that must be confirmed. */
export function renderChallengePage(): string {
  return page('Confirm with your bank', `
    <small>Local payment fake: stands for the bank</small>
    <h1>Confirm this payment</h1>
    <form method="post">
      <button class="first" name="do" value="confirm">Confirm</button>
      <button name="do" value="refuse">Refuse</button>
    </form>`)
}
