import type { ResolvedPart } from '#shared/build/resolve.ts'
import type { Model } from '#shared/catalog/model.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'

/** What a tag says of its part: as short as on a drawing sheet. */
export interface Face {
  ref: string
  title: string
  /** Key figures, one a line. */
  lines: readonly string[]
}

export function faceOf(part: ResolvedPart): Face {
  const { model } = part
  return { ref: part.part.ref, title: part.part.name ?? shortName(model), lines: keyFigures(model) }
}

/** A model's name without what its kind and its figures say already. */
function shortName(model: Model): string {
  switch (model.kind) {
    case 'supply':
      return `supply ${figure(model.supply?.total_W, 'W')}`
    case 'drive':
      return driveTitle(model)
    default:
      return model.name.charAt(0).toLowerCase() === model.name.charAt(1) ? model.name : lowerFirst(model.name)
  }
}

/** "Lead" reads as a heading; "SATA lead" keeps its capitals. */
const lowerFirst = (text: string): string =>
  /^[A-Z][a-z]/.test(text) ? text.charAt(0).toLowerCase() + text.slice(1) : text

function driveTitle(model: Model): string {
  const { drive } = model
  if (!drive) return model.name
  const speed = drive.rotation_rpm > 0 ? String(drive.rotation_rpm) : 'SSD'
  return `${capacity(drive.capacity_TB)} ${drive.protocol === 'nvme' ? 'NVMe' : drive.protocol.toUpperCase()}, ${speed}`
}

/** "3 TB", "480 GB". */
export function capacity(quantity: Quantity): string {
  const value = quantity.value
  if (value === null) return 'size unknown'
  return value < 1 ? `${Math.round(value * 1000)} GB` : `${trim(value)} TB`
}

/** The few figures by which a model is told from its neighbours on the shelf. */
export function keyFigures(model: Model): string[] {
  if (model.supply) {
    const rails = model.supply.rails.map(
      (rail) => `${rail.id.startsWith(rail.rail) ? spaced(rail.id) : rail.rail} ${figure(rail.limit_A, 'A')}`,
    )
    const groups = model.supply.groups.map(
      (group) => `${group.name} ${figure(group.limit_W ?? group.limit_A, group.limit_W ? 'W' : 'A')}`,
    )
    return [...rails, ...groups]
  }
  const lines: string[] = []
  for (const controller of model.controllers)
    lines.push(`${controller.ports.length} ports, ${figure(controller.rate_Gbps, 'Gb/s')}`)
  if (model.expander) lines.push(`expander, ${figure(model.expander.rate_Gbps, 'Gb/s')}`)
  if (model.cable)
    lines.push(
      `${figure(model.cable.length_mm, 'mm')}${model.cable.direction === 'symmetric' ? '' : `, ${model.cable.direction}`}`,
    )
  if (model.bays.length > 0) lines.push(`${model.bays.length} bays`)
  if (model.drive) {
    const peak = model.load?.['12V']?.start?.peak_A ?? model.load?.['5V']?.write_A ?? model.load?.['5V']?.scan_A
    if (peak) lines.push(`${model.load?.['12V']?.start ? 'start' : 'peak'} ${figure(peak, 'A')}`)
  }
  if (model.construction && model.construction !== 'unknown' && model.construction !== 'board')
    lines.push(model.construction)
  return lines
}

const spaced = (railId: string): string => railId.replace(/V(\d)$/, 'V $1')

/** "54 A", "about 2 A", "1.7 to 2.2 A", "unknown". */
export function figure(quantity: Quantity | undefined, unit: string): string {
  if (!quantity) return `unknown ${unit}`
  const { value, low, high } = quantity
  if (value === null)
    return low !== undefined && high !== undefined ? `${trim(low)} to ${trim(high)} ${unit}` : `unknown ${unit}`
  const about = quantity.origin === 'guess' ? 'about ' : ''
  return `${about}${trim(value)} ${unit}`
}

const trim = (value: number): string => String(Math.round(value * 100) / 100)

/** The last characters of a serial, as they are read off a label in a bay. */
export const serialTail = (serial: string | undefined): string =>
  serial === undefined ? '' : serial.length > 6 ? `…${serial.slice(-4)}` : serial
