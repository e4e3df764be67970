import { keyFigures, keyFigureText, type Measurements, type Say, type SheetDefinition } from '../../../shared/domain/measuring/index'
import { t } from '../texts/translate'

/** A drawing in words, for whoever does not see it: the animal, from where it is seen, its points, width and length. */
export function drawingWords(definition: SheetDefinition, measurements: Measurements, locale: string): string {
  const say: Say = (key, params) => t(locale, key, params)
  return t(locale, `sheet.drawing.${definition.family}`, {
    animal: t(locale, `animals.classes.${definition.category}`),
    figures: keyFigures(definition, measurements).map(figure => keyFigureText(say, definition, figure)).join(', '),
  })
}
