import sharp from 'sharp'
import type { Random } from './random'

/** From where a head is seen. */
export type View = 'front' | 'left' | 'right' | 'field'

/** Units of the drawing; the picture itself is two thirds as large. */
const WIDTH = 960
const HEIGHT = 720
const PIXELS = { width: 640, height: 480 }

type Point = readonly [x: number, y: number]

const path = (points: readonly Point[]) => points.map(([x, y], place) => `${place === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`).join('')
const stroke = (points: readonly Point[], width: number, colour: string) =>
  `<path d="${path(points)}" fill="none" stroke="${colour}" stroke-width="${width}" stroke-linecap="round" stroke-linejoin="round"/>`

/** A curve that bends steadily: begins in a direction, turns by so much over its length. */
function bent(from: Point, length: number, direction: number, turn: number): Point[] {
  const steps = 14
  const points: Point[] = [from]
  let [x, y] = from
  for (let step = 0; step < steps; step++) {
    const angle = direction + turn * step / steps
    x += Math.cos(angle) * length / steps
    y += Math.sin(angle) * length / steps
    points.push([x, y])
  }
  return points
}

const BONE = '#cbb894'
const SHADE = '#8d7a58'

function antler(from: Point, side: 1 | -1, scale: number, tines: number, random: Random): string {
  const beam = bent(from, 300 * scale, side > 0 ? -0.5 : Math.PI + 0.5, side > 0 ? -1.25 : 1.25)
  const parts = [stroke(beam, 16 * scale, SHADE), stroke(beam, 11 * scale, BONE)]
  for (let tine = 0; tine < tines; tine++) {
    const root = beam[2 + Math.floor(tine * 10 / tines)]!
    const length = (110 - Math.abs(tine - tines / 3) * 16) * scale * (0.85 + 0.3 * random.next())
    parts.push(stroke(bent(root, length, -Math.PI / 2 + side * 0.15, -side * 0.25), 8 * scale, BONE))
  }
  return parts.join('')
}

function horn(from: Point, side: 1 | -1, scale: number, curl: number): string {
  const line = bent(from, 330 * scale, side > 0 ? -0.9 : Math.PI + 0.9, side * curl)
  return line.slice(1).map((point, step) => stroke([line[step]!, point], (46 - step * 3) * scale, step % 2 ? SHADE : BONE)).join('')
}

function skull(x: number, y: number, scale: number): string {
  const at = (dx: number, dy: number) => `${(x + dx * scale).toFixed(1)} ${(y + dy * scale).toFixed(1)}`
  const half = (side: 1 | -1) => `C${at(side * 70, -105)} ${at(side * 92, -40)} ${at(side * 78, 10)}C${at(side * 70, 50)} ${at(side * 40, 110)} ${at(side * 32, 205)}`
  return `<path d="M${at(0, -115)}${half(1)}L${at(-32, 205)}" fill="${BONE}"/><path d="M${at(0, -115)}${half(-1)}L${at(32, 205)}" fill="${BONE}"/>
    <ellipse cx="${x - 62 * scale}" cy="${y + 2 * scale}" rx="${15 * scale}" ry="${21 * scale}" fill="#4a4032"/><ellipse cx="${x + 62 * scale}" cy="${y + 2 * scale}" rx="${15 * scale}" ry="${21 * scale}" fill="#4a4032"/>
    <path d="M${at(0, 118)}L${at(15, 190)}L${at(-15, 190)}Z" fill="#4a4032"/><path d="M${at(0, -110)}L${at(0, 95)}" stroke="${SHADE}" stroke-width="${2 * scale}"/>`
}

function animal(family: string, view: View, random: Random): string {
  const middle: Point = [WIDTH / 2, view === 'field' ? 400 : 430]
  const scale = view === 'field' ? 0.55 : 1
  const sides: readonly (1 | -1)[] = view === 'left' ? [-1] : view === 'right' ? [1] : [-1, 1]
  const grown = sides.map((side) => {
    const root: Point = [middle[0] + side * 40 * scale, middle[1] - 90 * scale]
    if (['deer', 'elk', 'moose', 'caribou'].includes(family)) return antler(root, side, scale * (family === 'elk' ? 1.25 : 1), family === 'elk' ? 6 : 4, random)
    if (family === 'skull') return ''
    return horn(root, side, scale, family === 'sheep' ? 5.2 : family === 'pronghorn' ? 1.6 : 1)
  })
  return grown.join('') + skull(middle[0], middle[1], scale)
}

function backdrop(view: View, random: Random): string {
  if (view !== 'field') {
    const tone = random.whole(196, 224)
    return `<rect width="${WIDTH}" height="${HEIGHT}" fill="rgb(${tone},${tone - 6},${tone - 16})"/>
      <rect y="600" width="${WIDTH}" height="120" fill="rgb(${tone - 60},${tone - 74},${tone - 92})"/>`
  }
  const ridge = Array.from({ length: 13 }, (_, step): Point => [step * 80, 300 - random.whole(0, 120)])
  return `<rect width="${WIDTH}" height="${HEIGHT}" fill="#a9bcc6"/>
    <path d="${path([[0, HEIGHT], ...ridge, [WIDTH, HEIGHT]])}Z" fill="#6f7f6a"/><rect y="470" width="${WIDTH}" height="250" fill="#8c8456"/>`
}

/** A photograph as somebody might send it, drawn: a real JPEG, different for every stream. */
export function photograph(family: string, view: View, random: Random): Promise<Buffer> {
  const grain = Array.from({ length: 160 }, () =>
    `<circle cx="${random.whole(0, WIDTH)}" cy="${random.whole(0, HEIGHT)}" r="${random.whole(1, 3)}" fill="#000" opacity="0.06"/>`).join('')
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="${PIXELS.width}" height="${PIXELS.height}" viewBox="0 0 ${WIDTH} ${HEIGHT}">${backdrop(view, random)}${animal(family, view, random)}${grain}</svg>`
  return sharp(Buffer.from(svg)).jpeg({ quality: 72 }).toBuffer()
}

/** Text in PDF's own encoding for strings: what is outside Latin-1 becomes a question mark. */
const pdfText = (line: string) => [...line].map(letter => letter.codePointAt(0)! > 255 ? '?' : letter).join('').replace(/[\\()]/g, letter => `\\${letter}`)

/** One page of text as a PDF (ISO 32000-1), with one of the fonts that every reader has. */
export function letter(title: string, lines: readonly string[]): Buffer {
  const text = [`BT /F1 18 Tf 60 770 Td (${pdfText(title)}) Tj ET`, ...lines.map((line, place) => `BT /F1 11 Tf 60 ${730 - place * 18} Td (${pdfText(line)}) Tj ET`)].join('\n')
  const content = Buffer.from(text, 'latin1')
  const objects = [
    '<< /Type /Catalog /Pages 2 0 R >>',
    '<< /Type /Pages /Kids [3 0 R] /Count 1 >>',
    '<< /Type /Page /Parent 2 0 R /MediaBox [0 0 595 842] /Resources << /Font << /F1 5 0 R >> >> /Contents 4 0 R >>',
    `<< /Length ${content.length} >>\nstream\n${content.toString('latin1')}\nendstream`,
    '<< /Type /Font /Subtype /Type1 /BaseFont /Helvetica /Encoding /WinAnsiEncoding >>',
  ]
  let body = '%PDF-1.4\n'
  const offsets = objects.map((object, place) => {
    const offset = body.length
    body += `${place + 1} 0 obj\n${object}\nendobj\n`
    return offset
  })
  const table = body.length
  body += `xref\n0 ${objects.length + 1}\n0000000000 65535 f \n${offsets.map(offset => `${String(offset).padStart(10, '0')} 00000 n \n`).join('')}`
  body += `trailer\n<< /Size ${objects.length + 1} /Root 1 0 R >>\nstartxref\n${table}\n%%EOF\n`
  return Buffer.from(body, 'latin1')
}
