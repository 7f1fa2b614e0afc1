const COPIED = ['fill', 'fill-opacity', 'stroke', 'stroke-width', 'stroke-dasharray', 'stroke-linecap', 'font-family', 'font-size', 'font-style', 'font-weight', 'text-anchor', 'opacity']
const PNG_SCALE = 2

/** Saves a drawing as it stands on the page: SVG with its colours written in, or the same as PNG; and its numbers as CSV. */
export function useFigureExport(fileStem: () => string) {
  async function saveSvg(svg: SVGSVGElement) {
    save(new Blob([standaloneSvg(svg)], { type: 'image/svg+xml' }), `${fileStem()}.svg`)
  }

  async function savePng(svg: SVGSVGElement) {
    const { width, height } = svg.viewBox.baseVal
    const address = URL.createObjectURL(new Blob([standaloneSvg(svg)], { type: 'image/svg+xml' }))
    try {
      const picture = new Image()
      picture.src = address
      await picture.decode()
      const canvas = Object.assign(document.createElement('canvas'), { width: width * PNG_SCALE, height: height * PNG_SCALE })
      canvas.getContext('2d')?.drawImage(picture, 0, 0, canvas.width, canvas.height)
      const blob = await new Promise<Blob | null>(resolve => canvas.toBlob(resolve, 'image/png'))
      if (!blob) throw new Error('This browser could not turn the drawing into a PNG; save it as SVG instead.')
      save(blob, `${fileStem()}.png`)
    } finally {
      URL.revokeObjectURL(address)
    }
  }

  function saveCsv(csv: string) {
    save(new Blob([csv], { type: 'text/csv;charset=utf-8' }), `${fileStem()}.csv`)
  }

  function saveAddress(address: string, ending: 'svg' | 'png') {
    follow(address, `${fileStem()}.${ending}`)
  }

  return { saveSvg, savePng, saveCsv, saveAddress }
}

/** A copy that needs no style sheet: what the classes and variables gave stands in presentation attributes, on the sheet's colour. */
function standaloneSvg(svg: SVGSVGElement): string {
  const copy = svg.cloneNode(true) as SVGSVGElement
  const originals = [svg, ...svg.querySelectorAll<SVGElement>('*')]
  const copies = [copy, ...copy.querySelectorAll<SVGElement>('*')]
  originals.forEach((original, index) => {
    const seen = getComputedStyle(original)
    for (const name of COPIED) copies[index]?.setAttribute(name, seen.getPropertyValue(name))
    for (const name of ['class', 'data-measure']) copies[index]?.removeAttribute(name)
  })
  const { x, y, width, height } = svg.viewBox.baseVal
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg')
  copy.setAttribute('width', String(width))
  copy.setAttribute('height', String(height))
  const paper = document.createElementNS('http://www.w3.org/2000/svg', 'rect')
  const colour = getComputedStyle(svg.closest('.sheet') ?? svg).backgroundColor
  for (const [name, value] of Object.entries({ x, y, width, height, fill: colour })) paper.setAttribute(name, String(value))
  copy.prepend(paper)
  return new XMLSerializer().serializeToString(copy)
}

function save(blob: Blob, name: string) {
  const address = URL.createObjectURL(blob)
  follow(address, name)
  setTimeout(() => URL.revokeObjectURL(address), 10_000)
}

function follow(address: string, name: string) {
  Object.assign(document.createElement('a'), { href: address, download: name }).click()
}
