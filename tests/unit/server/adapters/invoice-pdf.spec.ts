import { execFileSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { type InvoicePaper, renderInvoicePdf } from '#server/adapters/pdf/invoice'

const font = (name: string) => readFileSync(new URL(`../../../../assets/fonts/IBMPlexSans_${name}.ttf`, import.meta.url))
const FONTS = { regular: font('400Regular'), medium: font('500Medium'), semiBold: font('600SemiBold') }
const folder = mkdtempSync(join(tmpdir(), 'holdtime-pdf-'))
afterAll(() => rmSync(folder, { recursive: true, force: true }))

type Line = InvoicePaper['lines'][number]
const line = (position: number, changes: Partial<Line> = {}): Line => ({ invoiceId: 'i', position, kind: 'mounting', label: 'Sample mounting', unit: 'sample', estimatedQuantity: null, quantity: 1, unitPriceMinor: 12_000, estimatedNetMinor: null, netMinor: 12_000, ...changes })

const LINES: Line[] = [
  line(1, { kind: 'cryostat-day', label: 'Time at the cryostat', unit: 'd', estimatedQuantity: 2.5, quantity: 2.75, unitPriceMinor: 31_000, estimatedNetMinor: 77_500, netMinor: 85_250 }),
  line(2, { kind: 'helium-litre', label: 'Liquid helium used', unit: 'L', estimatedQuantity: 92, quantity: 101.4, unitPriceMinor: 1450, estimatedNetMinor: 133_400, netMinor: 147_030 }),
  line(3, { kind: 'recovery-litre', label: 'Helium returned to recovery', unit: 'L eq', estimatedQuantity: 80, quantity: 84.2, unitPriceMinor: -600, estimatedNetMinor: -48_000, netMinor: -50_520 }),
]

// By hand: 852.50 + 1470.30 − 505.20 = 1817.60 net; 25 % is 454.40; total 2272.00; less 600.00 paid, 1672.00 due. Estimated net 1629.00.
function paper(changes: Partial<InvoicePaper['invoice']> = {}, more: Partial<InvoicePaper> = {}): InvoicePaper {
  return {
    invoice: {
      id: 'i', kind: 'invoice', series: 'A', year: 2027, sequence: 41, number: '2027-0041', runId: 'r', groupId: 'g', correctsInvoiceId: null, issuedAt: new Date('2027-05-10T10:00:00Z'), issuedOn: '2027-05-10', dueOn: '2027-06-09', suppliedOn: '2027-05-09',
      seller: { name: 'Skerry Low-Temperature Facility', addressLines: ['Quay House 3', '5003 Skerry'], email: 'desk@skerry.example', vatId: 'NO 000 000 000 MVA' },
      buyer: { name: 'Rowan Materials Ltd, Rowan Materials group', addressLines: ['Works Road 7', '2100 Strand'], email: 'accounts@rowan.example', vatId: 'DK 00 00 00 00' },
      reference: 'PO 4471', currency: 'EUR', vatBasisPoints: 2500, reverseCharge: false, netMinor: 181_760, vatMinor: 45_440, totalMinor: 227_200, prepaidMinor: 60_000, dueMinor: 167_200, paymentText: 'The balance is charged to the card that paid the deposit.', ...changes,
    },
    lines: LINES,
    run: { number: 218, title: 'Θ_D, γ and β₃ of CeRh₂Si₂ (T³, T⁴)', slot: { startsAt: new Date('2027-05-07T08:00:00Z'), endsAt: new Date('2027-05-09T16:00:00Z') }, startedAt: new Date('2027-05-07T08:05:00Z'), finishedAt: new Date('2027-05-09T15:12:00Z'), cutShort: false },
    cryostat: 'Petrel', timeZone: 'Europe/Oslo', ...more,
  }
}

async function read(facts: InvoicePaper) {
  const file = join(folder, 'paper.pdf')
  writeFileSync(file, await renderInvoicePdf(facts, FONTS))
  const tool = (name: string, ...args: string[]) => execFileSync(name, args, { encoding: 'utf8' }).replaceAll(/[\u00A0\u2009]/g, ' ')
  const text = tool('pdftotext', '-layout', file, '-')
  return { text, lines: text.split('\n').map(row => row.trim().replaceAll(/ {2,}/g, '  ')), info: tool('pdfinfo', file), fonts: tool('pdffonts', file) }
}

describe('the paper of an invoice', () => {
  it('says who, to whom, when, for which run, and what each line came to beside its estimate', async () => {
    const { text, lines } = await read(paper())
    for (const words of ['Invoice 2027-0041', 'Skerry Low-Temperature Facility', '5003 Skerry', 'VAT NO 000 000 000 MVA', 'Rowan Materials Ltd', '2100 Strand', 'VAT DK 00 00 00 00', '10 May 2027', '9 Jun 2027', 'PO 4471', 'Run 0218', 'Petrel, Fri 7 May 10:05 – Sun 9 May 17:12 (Europe/Oslo)']) expect(text).toContain(words)
    expect(lines).toContain('Time at the cryostat  2.50 d  2.75 d  € 310.00  € 775.00  € 852.50')
    expect(lines).toContain('Liquid helium used  92.0 L  101.4 L  € 14.50  € 1 334.00  € 1 470.30')
    expect(lines).toContain('Helium returned to recovery  80.0 L eq  84.2 L eq  −€ 6.00  −€ 480.00  −€ 505.20')
  })

  it('adds up: net beside its estimate, VAT with its base, total, deposit, due', async () => {
    const { lines } = await read(paper())
    for (const row of ['Net  € 1 629.00  € 1 817.60', 'VAT 25 % of € 1 817.60  € 454.40', 'Total  € 2 272.00', 'Deposit paid before  −€ 600.00', 'Amount due  € 1 672.00']) expect(lines).toContain(row)
  })

  it('prints Greek, raised and lowered figures, and embeds its fonts', async () => {
    const { text, fonts } = await read(paper())
    expect(text).toContain('Θ_D, γ and β₃ of CeRh₂Si₂ (T³, T⁴)')
    const embedded = fonts.split('\n').slice(2).filter(Boolean)
    expect(embedded).toHaveLength(3)
    for (const row of embedded) expect(row).toMatch(/IBMPlexSans-\w+ +CID TrueType +Identity-H +yes yes yes/)
  })

  it('is A4 with title and its own date, and the same facts give the same bytes', async () => {
    const { info } = await read(paper())
    expect(info).toMatch(/Title: +Invoice 2027-0041/)
    expect(info).toMatch(/Pages: +1\n/)
    expect(info).toMatch(/Page size: +595\.28 x 841\.89 pts \(A4\)/)
    const [first, second] = [await renderInvoicePdf(paper(), FONTS), await renderInvoicePdf(paper(), FONTS)]
    expect(first.equals(second)).toBe(true)
    expect(first.toString('latin1')).toContain('/Lang (en)')
    expect(first.equals(await renderInvoicePdf(paper({ number: '2027-0042' }), FONTS))).toBe(false)
  })

  it('names the reverse charge instead of a rate', async () => {
    const { lines, text } = await read(paper({ reverseCharge: true, vatBasisPoints: 0, vatMinor: 0, totalMinor: 181_760, dueMinor: 121_760 }))
    expect(lines).toContain('VAT, reverse charge  € 0.00')
    expect(text).toContain('Reverse charge: VAT is to be accounted for by the customer')
    expect(text).not.toContain('VAT 0 %')
  })

  it('says what goes back when more was paid before', async () => {
    const { lines } = await read(paper({ prepaidMinor: 250_000, dueMinor: -22_800, dueOn: null }))
    expect(lines).toContain('To be refunded  € 228.00')
    expect(lines.some(row => row.includes('Due '))).toBe(false)
  })

  it('as a credit note names the invoice it corrects, with its date', async () => {
    const { text, lines, info } = await read(paper({ kind: 'credit-note', number: 'C2027-0001', prepaidMinor: 0, dueMinor: 227_200, dueOn: null }, { corrects: { number: '2027-0039', issuedOn: '2027-05-01' } }))
    expect(info).toMatch(/Title: +Credit note C2027-0001/)
    expect(text).toContain('Corrects invoice 2027-0039 of 1 May 2027.')
    expect(lines).toContain('Amount credited  € 2 272.00')
  })

  it.each([[20], [45], [120]])('keeps each of %i lines and the sums, on numbered pages with heads', async (count) => {
    const lines = Array.from({ length: count }, (_, index) => line(index + 1, { label: `Sample mounting of a piece with a long name, number ${index + 1}` }))
    const { text, info } = await read(paper({}, { lines }))
    const pages = Number(/Pages: +(\d+)/.exec(info)?.[1])
    expect(pages).toBeGreaterThan(1)
    expect(text.match(/€ 120\.00 +–  +€ 120\.00/g)).toHaveLength(count)
    for (let page = 1; page <= pages; page += 1) expect(text).toContain(`page ${page} of ${pages}`)
    expect(text.match(/Invoice 2027-0041, continued/g)).toHaveLength(pages - 1)
    expect(text.match(/Amount due/g)).toHaveLength(1)
  })

  it('breaks long names and addresses instead of running over', async () => {
    const long = paper()
    const { text } = await read({ ...long, run: { ...long.run, title: 'A title that goes on '.repeat(8) }, invoice: { ...long.invoice, buyer: { ...long.invoice.buyer, name: 'The Association for Materials at Low Temperature of the Northern and Western Islands', addressLines: Array.from({ length: 7 }, (_, index) => `Address line ${index + 1}`) } } })
    const at = (words: string) => text.indexOf(words)
    expect(at('Address line 7')).toBeGreaterThan(at('Western Islands'))
    expect(at('Run 0218')).toBeGreaterThan(at('VAT DK'))
    expect(at('Item')).toBeGreaterThan(at('Petrel'))
  })

  it('prints yen without decimals', async () => {
    const { lines } = await read(paper({ currency: 'JPY', prepaidMinor: 0, dueMinor: 227_200 }))
    expect(lines).toContain('Amount due  ¥ 227 200')
  })
})
