import type { Curve } from './geometry'
import type { Drawing, Part } from './types'

/** Path data of a curve (SVG 2), in hundredths of an inch at most. */
export function pathOf(curve: Curve, closed = false): string {
  if (curve.length === 0) return ''
  return `M${curve.map(({ x, y }) => `${short(x)} ${short(y)}`).join('L')}${closed ? 'Z' : ''}`
}

const short = (value: number) => String(Math.round(value * 100) / 100)

/** Two fine lines along a limb on its shadow side, as an engraver would lay them; nothing for what is no limb. */
export function grainOf({ tape, outline }: Part): string {
  if (tape.length < 6 || outline.length !== tape.length * 2) return ''
  const last = tape.length - 1
  const line = (depth: number, until: number) => tape.slice(1, Math.max(3, Math.round(last * until))).map(({ x, y }, n) => {
    const edge = outline[outline.length - 2 - n]!
    return { x: x + (edge.x - x) * depth, y: y + (edge.y - y) * depth }
  })
  return pathOf(line(0.34, 0.82)) + pathOf(line(0.68, 0.6))
}

const MARGIN = 0.04

/** The part of the plane that a picture shows, with a little air around it: x, y, width, height in inches. */
export function viewBoxOf({ box }: Pick<Drawing, 'box'>): readonly [x: number, y: number, width: number, height: number] {
  const [width, height] = [Math.max(1, box.right - box.left), Math.max(1, box.bottom - box.top)]
  const air = Math.max(width, height) * MARGIN
  return [box.left - air, box.top - air, width + 2 * air, height + 2 * air].map(value => Math.round(value * 100) / 100) as unknown as readonly [number, number, number, number]
}

const escaped = (text: string) => text.replace(/[&<>"']/g, letter => `&#${letter.charCodeAt(0)};`)

/** Colours of both themes and of paper; a picture by itself cannot read the page's. */
const STYLE = '.g{fill:#d9d0bd}.o{fill:#f3ead6}.o,.g{stroke:#20261e;stroke-width:1.2;stroke-linejoin:round}.n{fill:none;stroke:#20261e;stroke-width:.7;opacity:.38}path{vector-effect:non-scaling-stroke}'
  + '@media(prefers-color-scheme:dark){.g{fill:#3a3f40}.o{fill:#2b2f30}.o,.g,.n{stroke:#ece6d6}}@media print{.o,.g{fill:#fff;stroke:#000}.n{stroke:#000}}'

/** A picture that stands by itself, of these words. */
export function svgOf(drawing: Drawing, title: string): string {
  const [x, y, width, height] = viewBoxOf(drawing)
  const grounds = drawing.ground.map(curve => `<path class="g" d="${pathOf(curve, true)}"/>`)
  const limbs = drawing.parts.filter(part => part.outline.length > 0).map((part) => {
    const grain = grainOf(part)
    return `<path class="o" d="${pathOf(part.outline, true)}"/>${grain ? `<path class="n" d="${grain}"/>` : ''}`
  })
  // A skull's eyes lie on the bone; a plate lies under its antlers.
  const inside = drawing.view === 'above' ? [...limbs, ...grounds] : [...grounds, ...limbs]
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="${x} ${y} ${width} ${height}" width="${Math.round(width * 24)}" height="${Math.round(height * 24)}" role="img"><title>${escaped(title)}</title><style>${STYLE}</style>${inside.join('')}</svg>`
}
