import { lineNames, type Unit } from '../quantity/display.ts'
import type { Quantity } from '../quantity/quantity.ts'
import { rails, type Rail } from '../quantity/rails.ts'
import type { Load, Model, RailLoad } from './model.ts'

/** One figure of a model as it is read and edited: where it is, what it is called, its unit. */
export interface ListedFigure {
  /** Path as part overrides take it, as "load.12V.start.peak_A". */
  path: string
  label: string
  unit: Unit
  quantity: Quantity
  /** Printed on the part's own label or the front page of its datasheet: asked for first. */
  onLabel: boolean
}

export interface FigureGroup {
  title: string
  figures: ListedFigure[]
}

/** Collects figures under one path, leaving out those that the model does not carry. */
function gather(base: string) {
  const figures: ListedFigure[] = []
  const add = (name: string, label: string, unit: Unit, quantity: Quantity | undefined, onLabel = false): void => {
    if (quantity) figures.push({ path: base === '' ? name : `${base}.${name}`, label, unit, quantity, onLabel })
  }
  return { figures, add }
}

/** Every figure of a model by group, in reading order. Wires are listed apart, with the wiring. */
export function listFigures(model: Model): FigureGroup[] {
  return [
    { title: 'Drive', figures: driveFigures(model) },
    { title: 'Current drawn', figures: loadFigures(model.load) },
    { title: 'Voltage accepted at the plug', figures: toleranceFigures(model) },
    { title: 'Supply rails', figures: railFigures(model) },
    { title: 'Rails made from others', figures: converterFigures(model) },
    { title: 'Shared limits', figures: groupFigures(model) },
    { title: 'Supply as a whole', figures: supplyFigures(model) },
    { title: 'Controller', figures: controllerFigures(model) },
    { title: 'Expander', figures: expanderFigures(model) },
    { title: 'Cable', figures: cableFigures(model) },
  ].filter((group) => group.figures.length > 0)
}

function driveFigures({ drive }: Model): ListedFigure[] {
  const { figures, add } = gather('drive')
  add('capacity_TB', 'Capacity', 'TB', drive?.capacity_TB, true)
  add('rate_Gbps', 'Line rate of the port', 'Gb/s', drive?.rate_Gbps, true)
  add('outerRate_MBps', 'Reading at the outer track', 'MB/s', drive?.outerRate_MBps)
  add('innerRate_MBps', 'Reading at the inner track', 'MB/s', drive?.innerRate_MBps)
  add('height_mm', 'Height', 'mm', drive?.height_mm)
  return figures
}

function loadFigures(load: Load | undefined): ListedFigure[] {
  return rails.flatMap((rail) => {
    const figures = load?.[rail]
    return figures ? railLoadFigures(rail, figures) : []
  })
}

function railLoadFigures(rail: Rail, load: RailLoad): ListedFigure[] {
  const name = lineNames[rail]
  const { figures, add } = gather(`load.${rail}`)
  add('scan_A', `${name}, at work`, 'A', load.scan_A, true)
  add('rest_A', `${name}, at rest`, 'A', load.rest_A)
  add('sleep_A', `${name}, asleep`, 'A', load.sleep_A)
  add('write_A', `${name}, in a write burst`, 'A', load.write_A, true)
  add('start.peak_A', `${name}, at start, highest that lasts`, 'A', load.start?.peak_A, true)
  add('start.mean_A', `${name}, at start, mean`, 'A', load.start?.mean_A)
  add('start.instant_A', `${name}, at start, highest instant`, 'A', load.start?.instant_A)
  add('start.seconds', `${name}, start lasts`, 's', load.start?.seconds)
  return figures
}

function toleranceFigures({ drive }: Model): ListedFigure[] {
  return rails.flatMap((rail) => {
    const tolerance = drive?.tolerance[rail]
    const { figures, add } = gather(`drive.tolerance.${rail}`)
    add('below_pct', `${lineNames[rail]}, below nominal`, '%', tolerance?.below_pct)
    add('above_pct', `${lineNames[rail]}, above nominal`, '%', tolerance?.above_pct)
    add('belowAtStart_pct', `${lineNames[rail]}, below nominal while starting`, '%', tolerance?.belowAtStart_pct)
    return figures
  })
}

function railFigures({ supply }: Model): ListedFigure[] {
  return (supply?.rails ?? []).flatMap((rail) => {
    const { figures, add } = gather(`supply.rails.${rail.id}`)
    const name = rail.id === rail.rail ? lineNames[rail.rail] : `${rail.id} (${lineNames[rail.rail]})`
    add('limit_A', `${name}, limit`, 'A', rail.limit_A, true)
    add('peak_A', `${name}, peak`, 'A', rail.peak_A)
    add('peak_s', `${name}, peak holds`, 's', rail.peak_s)
    add('setPoint_V', `${name}, set point`, 'V', rail.setPoint_V)
    return figures
  })
}

function converterFigures({ converters }: Model): ListedFigure[] {
  return converters.flatMap((converter) => {
    const { figures, add } = gather(`converters.${converter.id}`)
    const name = `${lineNames[converter.rail]} made from ${lineNames[converter.from.rail]}`
    add('limit_A', `${name}, limit`, 'A', converter.limit_A, true)
    add('setPoint_V', `${name}, set point`, 'V', converter.setPoint_V)
    add('efficiency', `${name}, efficiency (share)`, '', converter.efficiency)
    return figures
  })
}

function groupFigures({ supply }: Model): ListedFigure[] {
  return (supply?.groups ?? []).flatMap((group) => {
    const { figures, add } = gather(`supply.groups.${group.id}`)
    add('limit_W', group.name, 'W', group.limit_W, true)
    add('limit_A', group.name, 'A', group.limit_A, true)
    return figures
  })
}

function supplyFigures({ supply }: Model): ListedFigure[] {
  const { figures, add } = gather('supply')
  add('total_W', 'Rated power', 'W', supply?.total_W, true)
  add('peakTotal_W', 'Peak power', 'W', supply?.peakTotal_W)
  supply?.efficiency.forEach((point, i) =>
    add(`efficiency.${i}.efficiency`, `Efficiency at ${point.share * 100} % load (share)`, '', point.efficiency),
  )
  add('powerFactor', 'Power factor', '', supply?.powerFactor)
  return figures
}

function controllerFigures(model: Model): ListedFigure[] {
  return model.controllers.flatMap((controller) => {
    const { figures, add } = gather(`controllers.${controller.id}`)
    const name = model.controllers.length > 1 ? `${controller.name}, ` : ''
    add('rate_Gbps', `${name}line rate`, 'Gb/s', controller.rate_Gbps, true)
    add('maxDevices', `${name}devices at most`, '', controller.maxDevices)
    add('maxCapacity_TB', `${name}largest drive addressed whole`, 'TB', controller.maxCapacity_TB)
    return figures
  })
}

function expanderFigures({ expander }: Model): ListedFigure[] {
  const { figures, add } = gather('expander')
  add('rate_Gbps', 'Line rate', 'Gb/s', expander?.rate_Gbps, true)
  add('maxDevices', 'Devices at most', '', expander?.maxDevices)
  return figures
}

function cableFigures({ cable }: Model): ListedFigure[] {
  const { figures, add } = gather('cable')
  add('length_mm', 'Length', 'mm', cable?.length_mm, true)
  add('rate_Gbps', 'Highest line rate it is sold for', 'Gb/s', cable?.rate_Gbps, true)
  return figures
}
