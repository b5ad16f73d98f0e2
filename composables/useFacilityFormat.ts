import { formatInstant, formatSlot } from '#shared/utils/format-date'
import { formatMoney } from '#shared/utils/format-money'

/** Formatting in the facility's zone and currency, for pages that have both in their reply. */
export function useFacilityFormat(facts: () => { timeZone?: string, currency?: string } | null | undefined) {
  const timeZone = computed(() => facts()?.timeZone ?? 'UTC')
  const currency = computed(() => facts()?.currency ?? 'EUR')
  return {
    timeZone,
    instant: (at: string | Date) => formatInstant(at, timeZone.value),
    slot: (from: string | Date, to: string | Date) => formatSlot(from, to, timeZone.value),
    money: (amount: number) => formatMoney({ amount, currency: currency.value }),
  }
}
