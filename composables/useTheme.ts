/** What a person chose; `auto` follows the device. */
export type ThemeChoice = 'auto' | 'day' | 'night'

const COOKIE = 'holdtime-theme'

/** Sets the theme of `auto` before anything is painted; the server cannot know the device's. */
export const themeBeforePaint = `if(!/(?:^|; )${COOKIE}=(?:day|night)/.test(document.cookie)&&matchMedia('(prefers-color-scheme: dark)').matches)document.documentElement.dataset.theme='night'`

/** The theme: the choice (kept in a cookie for a year) and what it comes to. */
export function useTheme() {
  const choice = useCookie<ThemeChoice>(COOKIE, { default: () => 'auto', maxAge: 31_536_000, sameSite: 'lax' })
  const device = useState<'day' | 'night'>('device-theme', () => 'day')
  onMounted(() => {
    const query = matchMedia('(prefers-color-scheme: dark)')
    const read = () => {
      device.value = query.matches ? 'night' : 'day'
    }
    read()
    query.addEventListener('change', read)
    onScopeDispose(() => query.removeEventListener('change', read))
  })
  const resolved = computed(() => choice.value === 'day' || choice.value === 'night' ? choice.value : device.value)
  return { choice, resolved }
}
