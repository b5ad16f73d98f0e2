const KEPT = ['fill', 'fill-opacity', 'stroke', 'stroke-width', 'stroke-opacity', 'stroke-dasharray', 'opacity', 'font-family', 'font-size', 'font-weight', 'text-anchor', 'paint-order', 'color']

/**
 * A drawing on the page as a file of its own: colours and type as they are shown, on the ground of its card, without handles' targets.
 *
 * @param drawing the svg on the page
 * @returns the markup and its size in px
 */
export function standaloneSvg(drawing: SVGSVGElement): { markup: string, width: number, height: number } {
  const { width, height } = drawing.viewBox.baseVal
  const copy = drawing.cloneNode(true) as SVGSVGElement
  const originals = drawing.querySelectorAll<SVGElement>('*')
  copy.querySelectorAll<SVGElement>('*').forEach((element, index) => {
    const style = getComputedStyle(originals[index]!)
    if (element.closest('defs')) return
    for (const property of KEPT) element.style.setProperty(property, style.getPropertyValue(property))
    for (const attribute of ['class', 'tabindex', 'role']) element.removeAttribute(attribute)
  })
  copy.querySelectorAll('[fill="transparent"]').forEach(target => target.remove())
  const ground = document.createElementNS('http://www.w3.org/2000/svg', 'rect')
  for (const [name, value] of Object.entries({ width: '100%', height: '100%', fill: getComputedStyle(drawing).getPropertyValue('--color-surface').trim() })) ground.setAttribute(name, value)
  copy.prepend(ground)
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg')
  copy.setAttribute('width', String(width))
  copy.setAttribute('height', String(height))
  copy.removeAttribute('class')
  return { markup: new XMLSerializer().serializeToString(copy), width, height }
}

/** The same as a PNG, twice as fine as the screen. */
export async function drawPng(drawing: SVGSVGElement, scale = 2): Promise<Blob> {
  const { markup, width, height } = standaloneSvg(drawing)
  const image = new Image()
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(markup)}`
  await image.decode()
  const canvas = Object.assign(document.createElement('canvas'), { width: width * scale, height: height * scale })
  canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height)
  return new Promise((resolve, reject) => canvas.toBlob(blob => blob ? resolve(blob) : reject(new Error('The browser could not make a PNG of this plot.')), 'image/png'))
}
