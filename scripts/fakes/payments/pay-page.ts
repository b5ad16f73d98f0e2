import type Stripe from 'stripe'
import { formatMoney } from '#shared/utils/format-money'

const escape = (text: string) => text.replace(/[&<>"']/g, character => `&#${character.charCodeAt(0)};`)

const STYLE = `
  :root { color-scheme: light dark; --paper: #f6f4ee; --surface: #fffefb; --ink: #17212b; --muted: #5a6772; --edge: #77715f; --first: #122f57; --on-first: #fffefb; --fail: #a5302a }
  @media (prefers-color-scheme: dark) { :root { --paper: #0d141b; --surface: #131c25; --ink: #e5ecf2; --muted: #93a3b1; --edge: #6d7e8c; --first: #8fd0f0; --on-first: #0d141b; --fail: #ff8f85 } }
  body { font: 16px/1.5 "IBM Plex Sans", system-ui, sans-serif; background: var(--paper); color: var(--ink); margin: 0; display: grid; place-items: center; min-height: 100vh }
  main { background: var(--surface); border: 1px solid var(--edge); border-radius: 4px; padding: 2rem; width: min(26rem, 82vw) }
  h1 { font-size: 1.3rem; margin: .25rem 0 0 }
  .note { color: var(--muted); font-size: .85rem; margin: 0 }
  .amount { font: 600 1.8rem "IBM Plex Mono", ui-monospace, monospace; margin: .5rem 0 1.5rem }
  form { display: grid; gap: .6rem }
  button, a { font: inherit; min-height: 44px; box-sizing: border-box; padding: .6rem 1rem; border-radius: 4px; border: 1px solid var(--edge); background: none; color: inherit; text-align: left; text-decoration: none; cursor: pointer }
  a { display: block }
  .first { background: var(--first); color: var(--on-first); border-color: var(--first) }
  :focus-visible { outline: 3px solid #3a7ba6; outline-offset: 2px }
  [role=alert] { color: var(--fail) }`

function page(title: string, body: string): string {
  return `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width,initial-scale=1"><title>${escape(title)}</title><style>${STYLE}</style></head>
<body><main>${body}</main></body>
</html>`
}

const amountOf = (session: Stripe.Checkout.Session) => formatMoney({ amount: session.amount_total ?? 0, currency: (session.currency ?? 'eur').toUpperCase() })

/** The hosted page of an open session: plain HTML, each button a choice of the payer. */
export function renderPayPage(session: Stripe.Checkout.Session, title: string, said = ''): string {
  return page('Local payment fake', `
    <p class="note">Local payment fake: no money moves</p>
    <h1>${escape(title)}</h1>
    <p class="amount">${escape(amountOf(session))}</p>
    ${said ? `<p role="alert">${escape(said)}</p>` : ''}
    <form method="post" action="/pay/${session.id}">
      <button class="first" name="do" value="pay">Pay by card</button>
      <button name="do" value="challenge">Pay by a card whose bank asks to confirm</button>
      <button name="do" value="decline">Pay by a card that is declined</button>
      ${session.cancel_url ? `<a href="${escape(session.cancel_url)}">Leave without paying</a>` : ''}
    </form>`)
}

/** The bank's page of a card that must be confirmed (3-D Secure). */
export function renderChallengePage(session: Stripe.Checkout.Session): string {
  return page('Confirm with your bank', `
    <p class="note">Local payment fake: stands for the bank (3-D Secure)</p>
    <h1>Confirm this payment</h1>
    <p class="amount">${escape(amountOf(session))}</p>
    <form method="post" action="/pay/${session.id}">
      <button class="first" name="do" value="confirm">Confirm</button>
      <button name="do" value="refuse">Refuse</button>
    </form>`)
}

/** A session that is paid or over: nothing can be pressed, a link leads back. */
export function renderOverPage(session: Stripe.Checkout.Session, successUrl: string): string {
  const isPaid = session.status === 'complete'
  const back = isPaid ? successUrl : session.cancel_url
  return page('Local payment fake', `
    <p class="note">Local payment fake: no money moves</p>
    <h1>${isPaid ? 'This payment is done' : 'The time for this payment is over'}</h1>
    <p>${isPaid ? 'It was not taken again.' : 'Nothing was taken.'}</p>
    ${back ? `<a class="first" href="${escape(back)}">Go back to the facility</a>` : ''}`)
}

/** An address that belongs to no session. */
export function renderLostPage(): string {
  return page('Local payment fake', '<p class="note">Local payment fake: no money moves</p><h1>There is no such payment</h1><p>Start again from the facility\'s page.</p>')
}
