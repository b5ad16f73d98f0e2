import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'

const css = readFileSync(new URL('../../../assets/css/main.css', import.meta.url), 'utf8')
const night = css.indexOf(':root[data-theme="night"]')
const tokensOf = (block: string) => Object.fromEntries([...block.matchAll(/--color-([a-z0-9-]+):\s*(#[0-9a-f]{6})/g)].map(([, name, hex]) => [name!, hex!]))
const day = tokensOf(css.slice(css.indexOf(':root {'), night))
const themes = { day, night: { ...day, ...tokensOf(css.slice(night, css.indexOf('}', night))) } }

/** Relative luminance and contrast as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5].map(at => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map(part => part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4)
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue
}
function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number]
  return (light + 0.05) / (dark + 0.05)
}

const grounds = ['paper', 'surface', 'sunken']
const text = [
  ...['ink', 'muted', 'mark', 'ember', 'ok', 'caution', 'fail'].flatMap(ink => grounds.map(ground => [ink, ground])),
  ...['ok', 'caution', 'fail'].flatMap(tone => [[tone, `${tone}-soft`], ['ink', `${tone}-soft`], ['muted', `${tone}-soft`]]),
  ...['cold-1', 'cold-2', 'cold-3'].map(ground => ['on-cold', ground]),
  ...['rail', 'rail-raised'].flatMap(ground => [['rail-ink', ground], ['rail-muted', ground]]),
  ['on-primary', 'primary'],
]
// Outlines of controls, rings and filled shapes that carry meaning (WCAG 1.4.11).
const shapes = [
  ...['edge', 'focus', 'mark', 'ember', 'ok', 'caution', 'fail'].flatMap(shape => grounds.map(ground => [shape, ground])),
  ['rail-focus', 'rail'], ['rail-focus', 'rail-raised'],
]

describe.each(Object.entries(themes))('colours by %s', (_, tokens) => {
  const of = (name: string) => tokens[name] ?? expect.fail(`main.css has no --color-${name}`)

  it.each(text)('%s is readable on %s', (ink, ground) => {
    expect(contrast(of(ink!), of(ground!))).toBeGreaterThanOrEqual(4.5)
  })
  it.each(shapes)('%s is seen on %s', (shape, ground) => {
    expect(contrast(of(shape!), of(ground!))).toBeGreaterThanOrEqual(3)
  })
})

describe('on paper', () => {
  it('the colours of night are for the screen only', () => {
    const opened = [...css.slice(0, night).matchAll(/@media ([^{]+)\{|[{}]/g)].reduce<string[]>((open, [mark, media]) => mark === '}' ? open.slice(0, -1) : [...open, media?.trim() ?? ''], [])
    expect(opened).toContain('screen')
  })
})

describe('the measure itself', () => {
  it('gives 21 for black on white and 4.54 for #767676, as WCAG’s own examples do', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6)
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2)
  })
})
