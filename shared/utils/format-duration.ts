const THIN_SPACE = '\u2009'

/** A duration for people: `3 d 4 h`, `5 h 20 min`, `28 min`. */
export function formatDuration(durationS: number): string {
  const minutes = Math.round(Math.abs(durationS) / 60)
  const parts = minutes >= 24 * 60
    ? [[Math.floor(Math.round(minutes / 60) / 24), 'd'], [Math.round(minutes / 60) % 24, 'h']] as const
    : [[Math.floor(minutes / 60), 'h'], [minutes % 60, 'min']] as const
  const shown = parts.filter(([value]) => value > 0).map(([value, unit]) => `${value}${THIN_SPACE}${unit}`)
  return `${durationS < 0 && minutes > 0 ? '\u2212' : ''}${shown.join(' ') || `0${THIN_SPACE}min`}`
}
