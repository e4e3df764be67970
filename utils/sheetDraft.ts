import type { Line, Measurements, SheetDefinition, Side } from '#shared/domain/measuring/index'
import { formatSteps, hasSides, isCount, isList, SIDES } from '#shared/domain/measuring/index'

/** A point of a list as it is typed. */
export interface DraftPoint { side: Side, length: string, width: string }

/** A sheet as it is typed, nothing checked: what a form holds and a browser keeps. */
export interface SheetDraft {
  single: Record<string, string>
  right: Record<string, string>
  left: Record<string, string>
  /** A list that is not here was not looked at; an empty one says that there are none. */
  lists: Record<string, DraftPoint[]>
}

/** One place where something is written. */
export interface SheetPlace {
  /** As in answers of the server: `right.g2`, `insideSpread`, `abnormalPoints.0.length`. */
  readonly path: string
  readonly line: Line
  readonly side: Side | null
  readonly index: number | null
  readonly field: 'length' | 'width' | null
}

export const emptyDraft = (): SheetDraft => ({ single: {}, right: {}, left: {}, lists: {} })

export function isEmptyDraft(draft: SheetDraft): boolean {
  return [draft.single, draft.right, draft.left].every(part => Object.values(part).every(text => text.trim() === ''))
    && Object.keys(draft.lists).length === 0
}

/** The form in which the server takes measurements. */
export function writtenDraft(draft: SheetDraft): Record<string, unknown> {
  const filled = (part: Record<string, string>) => Object.fromEntries(Object.entries(part).filter(([, text]) => text.trim() !== ''))
  const lists = Object.fromEntries(Object.entries(draft.lists).map(([id, points]) => [id, points.map(({ side, length, width }) =>
    width.trim() === '' ? { side, length } : { side, length, width })]))
  return { ...filled(draft.single), right: filled(draft.right), left: filled(draft.left), ...lists }
}

/** A sheet that was kept in steps, as somebody would have typed it. */
export function draftOf(definition: SheetDefinition, measurements: Measurements): SheetDraft {
  const draft = emptyDraft()
  for (const line of definition.lines) {
    if (isList(line)) {
      const points = measurements.lists[line.id]
      if (points) {
        draft.lists[line.id] = points.map(point => ({
          side: point.side,
          length: formatSteps(point.length, definition.step),
          width: point.width === undefined ? '' : formatSteps(point.width, definition.step),
        }))
      }
      continue
    }
    for (const part of hasSides(line) ? SIDES : ['single' as const]) {
      const reading = measurements[part][line.id]
      if (reading !== undefined) draft[part][line.id] = typeof reading === 'string' ? reading : isCount(line) ? String(reading) : formatSteps(reading, definition.step)
    }
  }
  return draft
}

export function readPlace(draft: SheetDraft, place: SheetPlace): string {
  if (place.index !== null && place.field) return draft.lists[place.line.id]?.[place.index]?.[place.field] ?? ''
  return draft[place.side ?? 'single'][place.line.id] ?? ''
}

/** The draft with one place written over; the given one stays as it is. */
export function writePlace(draft: SheetDraft, place: SheetPlace, text: string): SheetDraft {
  if (place.index !== null && place.field) {
    const points = [...(draft.lists[place.line.id] ?? [])]
    const point = points[place.index]
    if (!point) return draft
    points[place.index] = { ...point, [place.field]: text }
    return { ...draft, lists: { ...draft.lists, [place.line.id]: points } }
  }
  const part = place.side ?? 'single'
  return { ...draft, [part]: { ...draft[part], [place.line.id]: text } }
}

/** How the lines of a sheet are set on paper: what is single, then what has two sides, then lists, then what is only recorded. */
export const SHEET_GROUPS = ['spread', 'lengths', 'points', 'palms', 'rounds', 'counts', 'lists', 'recorded'] as const
export type SheetGroup = (typeof SHEET_GROUPS)[number]

export function groupOf(line: Line): SheetGroup {
  if (line.kind === 'recordOnly') return 'recorded'
  if (isList(line) || line.kind === 'deductedCount') return 'lists'
  switch (line.nature) {
    case 'spread': case 'skull': return 'spread'
    case 'length': return 'lengths'
    case 'point': return 'points'
    case 'palm': case 'width': return 'palms'
    case 'circumference': return 'rounds'
    case 'count': return 'counts'
  }
}

export function groupedLines(definition: SheetDefinition): { group: SheetGroup, lines: Line[] }[] {
  return SHEET_GROUPS
    .map(group => ({ group, lines: definition.lines.filter(line => groupOf(line) === group) }))
    .filter(({ lines }) => lines.length > 0)
}

/**
 * Every place of a sheet in the order in which the tape goes.
 *
 * @param sideFirst finishes the right side before the left one begins
 */
export function placesOf(definition: SheetDefinition, draft: SheetDraft, sideFirst: boolean): SheetPlace[] {
  const lines = groupedLines(definition).flatMap(({ lines: grouped }) => grouped)
  const at = (line: Line, side: Side | null): SheetPlace => ({ path: side ? `${side}.${line.id}` : line.id, line, side, index: null, field: null })
  const sided = lines.filter(line => hasSides(line) && line.kind !== 'recordOnly')
  const single = lines.filter(line => !hasSides(line) && !isList(line) && line.kind !== 'recordOnly')
  const recorded = lines.filter(line => line.kind === 'recordOnly')
  const listed = lines.filter(isList).flatMap(line => (draft.lists[line.id] ?? []).flatMap((_, index) =>
    (line.width ? ['length', 'width'] as const : ['length'] as const).map(field => ({ path: `${line.id}.${index}.${field}`, line, side: null, index, field }))))
  return [
    ...single.filter(line => line.kind === 'credit').map(line => at(line, null)),
    ...(sideFirst ? SIDES.flatMap(side => sided.map(line => at(line, side))) : sided.flatMap(line => SIDES.map(side => at(line, side)))),
    ...single.filter(line => line.kind !== 'credit').map(line => at(line, null)),
    ...listed,
    ...recorded.flatMap(line => (hasSides(line) ? SIDES.map(side => at(line, side)) : [at(line, null)])),
  ]
}
