/**
 * A drawn chart as a file of its own: styles that come from the theme are written into the copy, on an opaque ground,
 * so that it looks the same in a talk as on the page.
 */
const COPIED = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-opacity',
  'stroke-linejoin',
  'opacity',
  'font-family',
  'font-size',
  'font-weight',
  'text-anchor',
  'paint-order',
]

export function svgDocument(svg: SVGSVGElement): string {
  const copy = svg.cloneNode(true) as SVGSVGElement
  const sources = [svg, ...svg.querySelectorAll<SVGElement>('*')]
  const targets = [copy, ...copy.querySelectorAll<SVGElement>('*')]
  sources.forEach((source, i) => {
    const style = getComputedStyle(source)
    for (const property of COPIED) {
      const value = style.getPropertyValue(property)
      if (value) targets[i]!.style.setProperty(property, value)
    }
  })
  copy.querySelectorAll('[data-screen-only]').forEach((element) => element.remove())
  const { width, height } = svg.viewBox.baseVal
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg')
  copy.setAttribute('width', String(width))
  copy.setAttribute('height', String(height))
  const ground = document.createElementNS('http://www.w3.org/2000/svg', 'rect')
  ground.setAttribute('width', '100%')
  ground.setAttribute('height', '100%')
  ground.setAttribute('fill', getComputedStyle(svg).getPropertyValue('--paper').trim() || '#ffffff')
  copy.insertBefore(ground, copy.firstChild)
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(copy)}`
}

export async function pngOf(svg: SVGSVGElement, pixelRatio = 2): Promise<Blob> {
  const { width, height } = svg.viewBox.baseVal
  const image = new Image()
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svgDocument(svg))}`
  await image.decode()
  const canvas = document.createElement('canvas')
  canvas.width = Math.round(width * pixelRatio)
  canvas.height = Math.round(height * pixelRatio)
  const context = canvas.getContext('2d')
  if (!context) throw new Error('This browser gives no canvas to draw on.')
  context.scale(pixelRatio, pixelRatio)
  context.drawImage(image, 0, 0, width, height)
  return new Promise((resolve, reject) =>
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error('The picture could not be written.'))),
      'image/png',
    ),
  )
}

export function saveFile(content: Blob | string, fileName: string, type = 'text/plain;charset=utf-8'): void {
  const url = URL.createObjectURL(typeof content === 'string' ? new Blob([content], { type }) : content)
  const link = document.createElement('a')
  link.href = url
  link.download = fileName
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 10_000)
}
