import { describe, expect, it } from 'vitest'
import type { HeliumAccount } from '#shared/helium/entries'
import { checkBalanced, checkCovered, heliumBalances } from '#shared/helium/entries'
import { boilOffEntry, correctionEntry, deliveryEntry, liquefactionEntry, returnEntry, stockTakeEntry, transferEntry } from '#shared/helium/movements'

const account = (kind: HeliumAccount['kind'], name: string): HeliumAccount => ({ accountId: name, kind, name })
const supplier = account('supplier', 'Supplier')
const dewar = account('dewar', 'D1')
const other = account('dewar', 'D2')
const cryostat = account('cryostat', 'Petrel')
const recovery = account('recovery', 'Recovery')
const lost = account('lost', 'Lost')

describe('helium movements', () => {
  it('books a delivery, a transfer with its loss, and boil-off', () => {
    const entries = [
      deliveryEntry({ supplier, dewar, amountMg: 12_000_000 }),
      transferEntry({ from: dewar, to: cryostat, takenMg: 5_000_000, arrivedMg: 4_400_000, recoveredMg: 500_000, recovery, lost }),
      boilOffEntry({ vessel: cryostat, gasMg: 1_000_000, recoveredMg: 900_000, recovery, lost }),
    ]
    // By hand: D1 12 − 5; Petrel 4.4 − 1; recovery 0.5 + 0.9; lost 0.1 + 0.1 (kg).
    expect(Object.fromEntries(heliumBalances(entries))).toEqual({ Supplier: -12_000_000, D1: 7_000_000, Petrel: 3_400_000, Recovery: 1_400_000, Lost: 200_000 })
  })

  it('leaves out lines of zero', () => {
    const entry = transferEntry({ from: dewar, to: cryostat, takenMg: 10, arrivedMg: 10, recovery, lost })
    expect(entry.postings).toEqual([{ accountId: 'D1', amountMg: -10 }, { accountId: 'Petrel', amountMg: 10 }])
  })

  it('books liquefaction and returns to the supplier', () => {
    expect(liquefactionEntry({ recovery, dewar, amountMg: 7 }).postings).toEqual([{ accountId: 'Recovery', amountMg: -7 }, { accountId: 'D1', amountMg: 7 }])
    expect(returnEntry({ from: recovery, supplier, amountMg: 7 }).postings).toEqual([{ accountId: 'Recovery', amountMg: -7 }, { accountId: 'Supplier', amountMg: 7 }])
  })

  it('posts the difference of a stock-take to lost, both ways, with its reason', () => {
    expect(stockTakeEntry({ account: dewar, lost, bookMg: 100, countedMg: 90, reason: ' slow leak ' })).toEqual({
      kind: 'stock-take', reason: 'slow leak', postings: [{ accountId: 'D1', amountMg: -10 }, { accountId: 'Lost', amountMg: 10 }],
    })
    expect(stockTakeEntry({ account: dewar, lost, bookMg: 90, countedMg: 100, reason: 'scale' })?.postings[0]).toEqual({ accountId: 'D1', amountMg: 10 })
    expect(stockTakeEntry({ account: dewar, lost, bookMg: 90, countedMg: 90, reason: '' })).toBeUndefined()
    expect(() => stockTakeEntry({ account: dewar, lost, bookMg: 90, countedMg: 80, reason: ' ' })).toThrow(/needs a reason/)
  })

  it('takes an entry back by its mirror image', () => {
    const entry = deliveryEntry({ supplier, dewar, amountMg: 5 })
    const back = correctionEntry(entry, 'entered twice')
    expect([...heliumBalances([entry, back]).values()]).toEqual([0, 0])
    expect(() => correctionEntry(entry, '')).toThrow(/needs a reason/)
  })

  it('refuses what cannot be', () => {
    expect(() => deliveryEntry({ supplier, dewar, amountMg: 0 })).toThrow(/above zero/)
    expect(() => deliveryEntry({ supplier, dewar, amountMg: 1.5 })).toThrow(/whole milligrams/)
    expect(() => deliveryEntry({ supplier, dewar: cryostat, amountMg: 1 })).toThrow(/Petrel cannot stand here.*dewar/)
    expect(() => transferEntry({ from: dewar, to: dewar, takenMg: 1, arrivedMg: 1, recovery, lost })).toThrow(/to itself/)
    expect(() => transferEntry({ from: dewar, to: other, takenMg: 5, arrivedMg: 6, recovery, lost })).toThrow(/More helium arrived in D2 than left D1/)
    expect(() => transferEntry({ from: dewar, to: other, takenMg: 5, arrivedMg: 4, recoveredMg: 2, recovery, lost })).toThrow(/recovered/)
    expect(() => boilOffEntry({ vessel: recovery, gasMg: 5, recoveredMg: 5, recovery, lost })).toThrow(/cannot stand here/)
  })

  it('refuses unbalanced, doubled, zero and single lines', () => {
    expect(() => checkBalanced([{ accountId: 'a', amountMg: 5 }, { accountId: 'b', amountMg: -4 }])).toThrow(/1.mg are left over/)
    expect(() => checkBalanced([{ accountId: 'a', amountMg: 5 }, { accountId: 'a', amountMg: -5 }])).toThrow(/Line 2 .*second time/)
    expect(() => checkBalanced([{ accountId: 'a', amountMg: 0 }, { accountId: 'b', amountMg: 0 }])).toThrow(/Line 1/)
    expect(() => checkBalanced([{ accountId: 'a', amountMg: 0 }])).toThrow(/gives and one that takes/)
  })

  it('refuses to take more than the books hold, but lets supplier and lost run on', () => {
    const entry = transferEntry({ from: dewar, to: cryostat, takenMg: 5000, arrivedMg: 5000, recovery, lost })
    expect(() => checkCovered(entry, [dewar, cryostat], new Map([['D1', 4999]]))).toThrow(/By the books D1 holds/)
    expect(() => checkCovered(entry, [dewar, cryostat], new Map([['D1', 5000]]))).not.toThrow()
    expect(() => checkCovered(deliveryEntry({ supplier, dewar, amountMg: 5 }), [supplier, dewar], new Map())).not.toThrow()
    expect(() => checkCovered(entry, [dewar], new Map([['D1', 5000]]))).toThrow(/does not exist/)
  })
})
