import type { IncomingMessage, ServerResponse } from 'node:http'
import type Stripe from 'stripe'
import { decodeForm, textAt } from './form'
import { renderChallengePage, renderLostPage, renderOverPage, renderPayPage } from './pay-page'
import type { Fake } from './server'
import { expireOverdue, payOnPage } from './sessions'

const SAID: Readonly<Record<string, string>> = {
  declined: 'Your card was declined. Try again or use another card.',
  refused: 'Your bank did not confirm the payment. Try again or use another card.',
}

/** The hosted page: `/pay/:id`, and `/pay/:id/challenge` for the bank's confirmation. Each answer to a button leads on to a page. */
export function handlePayPage(fake: Fake, request: IncomingMessage, url: URL, body: string, response: ServerResponse): void {
  const { store, webhooks } = fake
  expireOverdue(store, webhooks)
  const [, , id = '', step] = url.pathname.split('/')
  const session = store.sessions.get(id)
  const html = (text: string, status = 200) => void response.writeHead(status, { 'content-type': 'text/html; charset=utf-8', 'cache-control': 'no-store', 'content-security-policy': 'default-src \'none\'; style-src \'unsafe-inline\'' }).end(text)
  const go = (target: string) => void response.writeHead(303, { location: target }).end()
  if (!session) return html(renderLostPage(), 404)
  if (session.status !== 'open') return html(renderOverPage(session, successUrl(session)))
  const wantsBank = store.intents.get(String(session.payment_intent))?.status === 'requires_action'
  if (request.method !== 'POST') {
    return html(step === 'challenge' && wantsBank ? renderChallengePage(session) : renderPayPage(session, store.sessionFacts.get(id)!.title, SAID[url.searchParams.get('said') ?? '']))
  }
  switch (textAt(decodeForm(body), 'do')) {
    case 'pay':
      payOnPage(store, webhooks, session, 'pay')
      return go(successUrl(session))
    case 'challenge':
      payOnPage(store, webhooks, session, 'challenge')
      return go(`/pay/${id}/challenge`)
    case 'decline':
      payOnPage(store, webhooks, session, 'decline')
      return go(`/pay/${id}?said=declined`)
    case 'confirm':
      if (!wantsBank) return go(`/pay/${id}`)
      payOnPage(store, webhooks, session, 'pay')
      return go(successUrl(session))
    case 'refuse':
      if (wantsBank) payOnPage(store, webhooks, session, 'refuse')
      return go(`/pay/${id}?said=refused`)
    default:
      return html(renderPayPage(session, store.sessionFacts.get(id)!.title, 'Choose one of the cards.'), 400)
  }
}

const successUrl = (session: Stripe.Checkout.Session) => session.success_url?.replace('{CHECKOUT_SESSION_ID}', session.id) ?? '/'
