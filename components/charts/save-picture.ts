/** Offers text or bytes to the browser as a file. */
function saveFile(content: Blob, fileName: string): void {
  const url = URL.createObjectURL(content)
  const link = document.createElement('a')
  link.href = url
  link.download = fileName
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 10_000)
}

export function saveText(text: string, fileName: string, type: string): void {
  saveFile(new Blob([text], { type: `${type};charset=utf-8` }), fileName)
}

/** An SVG drawn twice as fine as on the screen, on the given ground. */
export async function savePng(svg: string, { fileName, width, height, ground }: PngOptions): Promise<void> {
  const image = new Image()
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(svg)}`
  await image.decode()
  const canvas = document.createElement('canvas')
  canvas.width = 2 * width
  canvas.height = 2 * height
  const context = canvas.getContext('2d')
  if (!context) return
  context.fillStyle = ground
  context.fillRect(0, 0, canvas.width, canvas.height)
  context.drawImage(image, 0, 0, canvas.width, canvas.height)
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'))
  if (blob) saveFile(blob, fileName)
}

interface PngOptions {
  fileName: string
  width: number
  height: number
  ground: string
}

const COPIED = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-opacity',
  'opacity',
  'paint-order',
  'font-family',
  'font-size',
  'font-weight',
  'text-anchor',
  'dominant-baseline',
]

/** A drawing of our own as a file that needs no style sheet: what the sheet says is written into every element. */
export function standaloneSvg(drawing: SVGSVGElement, ground: string): string {
  const copy = drawing.cloneNode(true) as SVGSVGElement
  const originals = [drawing, ...drawing.querySelectorAll<SVGElement>('*')]
  const copies = [copy, ...copy.querySelectorAll<SVGElement>('*')]
  originals.forEach((original, index) => {
    const style = getComputedStyle(original)
    COPIED.forEach((name) => copies[index].style.setProperty(name, style.getPropertyValue(name)))
    copies[index].removeAttribute('class')
  })
  const { width, height } = drawing.getBoundingClientRect()
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg')
  copy.setAttribute('width', String(Math.round(width)))
  copy.setAttribute('height', String(Math.round(height)))
  const paper = document.createElementNS('http://www.w3.org/2000/svg', 'rect')
  const box = drawing.viewBox.baseVal
  Object.entries({ x: box.x, y: box.y, width: box.width, height: box.height, fill: ground }).forEach(([name, value]) =>
    paper.setAttribute(name, String(value)),
  )
  copy.prepend(paper)
  return new XMLSerializer().serializeToString(copy)
}
