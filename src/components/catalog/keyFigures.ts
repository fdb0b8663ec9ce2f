import { listFigures } from '#shared/catalog/figureList.ts'
import type { Model } from '#shared/catalog/model.ts'
import { formatFigure, formatRange, isAbout, type Unit } from '#shared/quantity/display.ts'
import type { Quantity } from '#shared/quantity/quantity.ts'

/** "about 2 A", "unknown, 1.3 to 1.8 A" */
export function figureWords(quantity: Quantity, unit: Unit): string {
  if (quantity.value !== null) return `${isAbout(quantity) ? 'about ' : ''}${formatFigure(quantity.value, unit)}`
  const range = formatRange(quantity, unit)
  return range ? `unknown, ${range}` : 'unknown'
}

const lengthOf = (model: Model): string | undefined => {
  const length = model.cable?.length_mm ?? model.wiring.find((conductor) => conductor.length_mm)?.length_mm
  return length && figureWords(length, 'mm')
}

const count = (number: number, one: string, many: string): string | undefined =>
  number === 0 ? undefined : `${number} ${number === 1 ? one : many}`

/** The two or three things that tell one model of a kind from the next, for the list. */
export function keyFigures(model: Model): string {
  const figure = (path: string) =>
    listFigures(model)
      .flatMap((group) => group.figures)
      .find((one) => one.path === path)
  const words = (path: string, before = ''): string | undefined => {
    const found = figure(path)
    return found && `${before}${figureWords(found.quantity, found.unit)}`
  }
  const outlets = model.connectors.filter((connector) => /^(out|leg)-/.test(connector.id)).length
  const byKind: Partial<Record<Model['kind'], (string | undefined)[]>> = {
    drive: [words('drive.capacity_TB'), words('load.12V.start.peak_A', '12 V start ')],
    supply: [words('supply.total_W'), supplyRails(model)],
    lead: [count(outlets, 'outlet', 'outlets'), lengthOf(model)],
    splitter: [count(outlets, 'outlet', 'outlets'), lengthOf(model)],
    adapter: [model.construction, lengthOf(model)],
    breakout: [count(outlets, 'leg', 'legs'), lengthOf(model)],
    cable: [lengthOf(model)],
    controller: [count(model.controllers.flatMap((c) => c.ports).length, 'port', 'ports'), rateOf(model)],
    expander: [count(model.expander?.ports.length ?? 0, 'port', 'ports'), words('expander.rate_Gbps')],
    backplane: [count(model.connectors.filter((c) => c.bay !== undefined).length, 'bay', 'bays')],
    case: [count(model.bays.length, 'bay', 'bays')],
    board: [count(model.connectors.filter((c) => /^(sata|port)-/.test(c.id)).length, 'data port', 'data ports')],
    fan: [words('load.12V.scan_A', '12 V ')],
    load: [words('load.12V.scan_A', '12 V '), words('load.5V.scan_A', '5 V ')],
  }
  return (byKind[model.kind] ?? []).filter(Boolean).join('; ')
}

const rateOf = (model: Model): string | undefined => {
  const rate = model.controllers[0]?.rate_Gbps
  return rate && figureWords(rate, 'Gb/s')
}

const supplyRails = (model: Model): string | undefined => {
  const twelve = (model.supply?.rails ?? []).filter((rail) => rail.rail === '12V')
  if (twelve.length === 0) return undefined
  const first = figureWords(twelve[0]!.limit_A, 'A')
  return twelve.length === 1 ? `12 V ${first}` : `${twelve.length} rails of 12 V, first ${first}`
}
