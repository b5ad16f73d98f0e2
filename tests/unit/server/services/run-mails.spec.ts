import { describe, expect, it } from 'vitest'
import { type RunMailFacts, type RunMailKind, writeRunMail } from '#server/services/mail/run-mails'

const FACTS: RunMailFacts = {
  number: '0218', title: 'CeRh₂Si₂, C(T) from 1.5 K', cryostat: 'Petrel', group: 'Alder', facility: 'Skerry Low-Temperature Facility', timeZone: 'Europe/Oslo',
  startsAt: new Date('2027-05-07T08:00:00Z'), endsAt: new Date('2027-05-09T16:00:00Z'), link: 'https://holdtime.example/runs/1', currency: 'EUR', depositMinor: 60_000, payBy: new Date('2027-04-20T10:00:00Z'),
  reason: 'The magnet is out for repair.', invoiceNumber: '2027-0041', amountMinor: 163_760, actionUrl: 'https://pay.example/1',
}

const SAYS: Record<RunMailKind, string[]> = {
  'approved': ['pay the deposit', '€ 600.00', 'Tue 20 Apr 12:00'],
  'confirmed': ['is confirmed', 'received the deposit of € 1 637.60'],
  'declined': ['was declined', 'The magnet is out for repair.'],
  'lapsed': ['was not paid in time'],
  'finished': ['is finished'],
  'invoiced': ['2027-0041'],
  'balance-paid': ['Payment received', '€ 1 637.60'],
  'balance-failed': ['€ 1 637.60', 'bank transfer'],
  'balance-confirm': ['€ 1 637.60', 'https://pay.example/1'],
  'refunded': ['€ 1 637.60'],
  'lost-days': ['Another run now holds days'],
}

describe('a mail about a run', () => {
  it.each(Object.entries(SAYS) as [RunMailKind, string[]][])('%s says what happened, names the run and links to it', (kind, words) => {
    const { subject, text } = writeRunMail(kind, FACTS)
    const plain = `${subject}\n${text}`.replaceAll(/[\u00A0\u2009]/g, ' ')
    for (const word of words) expect(plain).toContain(word)
    expect(subject).toContain('0218')
    expect(subject).not.toMatch(/[\r\n]/)
    expect(text).toContain(FACTS.link)
    expect(text).toContain('Fri 7 May 10:00 – Sun 9 May 18:00 (facility time, Europe/Oslo)')
    expect(text).not.toMatch(/undefined|null|NaN/)
  })

  it('of a run without a deposit claims no money', () => {
    expect(writeRunMail('confirmed', { ...FACTS, amountMinor: undefined }).text).not.toContain('deposit')
  })
})
