import type { Side } from '../units'
import type { Curve } from './geometry'

/** One thing that is measured, as it is drawn. */
export interface Part {
  /** id of its line */
  readonly line: string
  readonly side: Side | null
  /** place on its list */
  readonly index: number | null
  /** where the tape runs, from its start to its end */
  readonly tape: Curve
  /** closed outline of what is measured; empty for what only reaches from one thing to another */
  readonly outline: Curve
}

/** A measurement that a picture in one plane cannot keep. Inches. */
export interface Residual {
  readonly line: string
  readonly side: Side | null
  readonly wanted: number
  readonly drawn: number
}

/** From where the animal is seen: its face, each side for itself, or the skull from above. */
export type View = 'front' | 'sides' | 'above'

export interface Box {
  readonly left: number
  readonly top: number
  readonly right: number
  readonly bottom: number
}

/**
 * An animal's antlers, horns or skull from its own numbers, in inches. Curves are rolled into the picture's plane so that
 * every length is true; then the spread is kept, then tip to tip; what is left over is told.
 */
export interface Drawing {
  readonly view: View
  /** what carries them: skull plate or brow; not measured */
  readonly ground: readonly Curve[]
  readonly parts: readonly Part[]
  readonly residuals: readonly Residual[]
  readonly box: Box
}
