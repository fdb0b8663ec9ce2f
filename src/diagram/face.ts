import type { ResolvedPart } from '#shared/build/resolve.ts'
import type { Model } from '#shared/catalog/model.ts'
import { driveWords, shortNumber, supplyLines, tagWords } from '#shared/paper/words.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'

/** What a part is called on its tag: its own name, else its model's, short. */
export function titleOf(part: ResolvedPart): string {
  const { model } = part
  return model.kind === 'drive' && part.part.name === undefined ? driveWords(model) : tagWords(part.part.name, model)
}

/** The few figures by which a model is told from its neighbours on the shelf. */
export function keyFigures(model: Model): string[] {
  if (model.supply) return supplyLines(model, 4)
  const lines: string[] = []
  for (const controller of model.controllers) {
    const modes = controller.modes.length > 1 ? ', two modes' : ''
    lines.push(`${controller.ports.length} ports, ${figureWords(controller.rate_Gbps, 'Gb/s')}${modes}`)
  }
  if (model.expander) lines.push(figureWords(model.expander.rate_Gbps, 'Gb/s'))
  if (model.cable) lines.push(`${figureWords(model.cable.length_mm, 'mm')}${directionWords(model.cable.direction)}`)
  if (model.bays.length > 0) lines.push(`${model.bays.length} bays`)
  if (model.pinoutFamily && model.kind === 'lead') lines.push(`pinout ${model.pinoutFamily}`)
  lines.push(...loadWords(model))
  if (model.construction && !quiet.has(model.construction)) lines.push(model.construction)
  return lines
}

const quiet = new Set(['unknown', 'board'])

const directionWords = (direction: string): string => (direction === 'symmetric' ? '' : `, ${direction}`)

function loadWords(model: Model): string[] {
  const motor = model.load?.['12V']
  if (motor?.start) return [`start ${figureWords(motor.start.peak_A, 'A')} at 12 V`]
  const write = model.load?.['5V']?.write_A
  if (write) return [`peak ${figureWords(write, 'A')} at 5 V`]
  return motor && model.kind !== 'board' ? [`${figureWords(motor.scan_A, 'A')} at 12 V`] : []
}

/** "54 A", "about 2 A", "1.7 to 2.2 A", "unknown A". */
export function figureWords(quantity: Quantity, unit: string): string {
  const { value, low, high, origin } = quantity
  if (value !== null) return `${origin === 'guess' ? 'about ' : ''}${shortNumber(value)} ${unit}`
  if (low !== undefined && high !== undefined) return `${shortNumber(low)} to ${shortNumber(high)} ${unit}`
  return `unknown ${unit}`
}
