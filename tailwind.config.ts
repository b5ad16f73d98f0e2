import type { Config } from 'tailwindcss'

const tokens = [
  'paper', 'surface', 'sunken', 'ink', 'muted', 'line', 'line-strong', 'edge', 'cold-1', 'cold-2', 'cold-3', 'on-cold', 'mark', 'helium', 'ember',
  'ok', 'caution', 'fail', 'ok-soft', 'caution-soft', 'fail-soft', 'focus', 'rail', 'rail-ink', 'rail-muted', 'rail-raised', 'rail-focus', 'primary', 'on-primary',
]

export default {
  content: ['./app.vue', './error.vue', './layouts/**/*.vue', './pages/**/*.vue', './components/**/*.vue', './composables/**/*.ts', './utils/**/*.ts', './shared/utils/**/*.ts'],
  theme: {
    colors: { transparent: 'transparent', current: 'currentColor', ...Object.fromEntries(tokens.map(token => [token, `var(--color-${token})`])) },
    borderRadius: { none: '0', DEFAULT: '4px', full: '9999px' },
    fontFamily: {
      sans: ['"IBM Plex Sans"', 'system-ui', 'sans-serif'],
      condensed: ['"IBM Plex Sans Condensed"', '"IBM Plex Sans"', 'sans-serif'],
      mono: ['"IBM Plex Mono"', 'ui-monospace', 'monospace'],
    },
    boxShadow: { none: 'none' },
    extend: {},
  },
} satisfies Config
