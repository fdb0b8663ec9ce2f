import { momentIds, type Figure, type MomentId } from '../check/result.ts'
import type { Line } from '../quantity/rails.ts'
import { onlyWay } from './downstream.ts'
import { figureOf } from './figures.ts'
import { lineIndex } from './lines.ts'
import type { ConductorLoad, DeviceLoad, PowerResult } from './result.ts'

/** A wire on the way to a device whose length or resistance is not known, so that a worst figure stands in. */
export interface UnsureWire {
  figure: Figure
  /** Share of its drop that is left with the figure at its low end. */
  least: number
  load: ConductorLoad
}

/** The unknown lengths and resistances on the way to a device and back, the rail's first. */
export function unsureWires(power: PowerResult, { connector, rail }: DeviceLoad): UnsureWire[] {
  return ([rail, 'return'] as const).flatMap((line: Line) => {
    const at = lineIndex[line]
    return onlyWay(power.network.byLine[at]!, connector.index).flatMap((branch) => {
      const load = power.byBranch[at]![branch]
      return load && 'conductor' in load ? unsure(load) : []
    })
  })
}

function unsure(load: ConductorLoad): UnsureWire[] {
  const { conductor } = load
  const [quantity, what, unit] = conductor.resistance_mohm
    ? [conductor.resistance_mohm, 'resistance', 'mohm']
    : [conductor.length_mm, 'length', 'mm']
  if (!quantity || quantity.value !== null) return []
  const least = quantity.high ? (quantity.low ?? 0) / quantity.high : 0
  return [{ figure: figureOf(quantity, `${what} of ${load.part.part.ref}`, unit), least, load }]
}

/** The moment's voltage with all unknown lengths at their low end, near enough: the currents stay what they are. */
export function voltageAtLeast(device: DeviceLoad, wires: readonly UnsureWire[], moment: MomentId): number {
  const m = momentIds.indexOf(moment)
  return wires.reduce(
    (volts, { least, load }) => volts + Math.abs(load.current_A[m]!) * load.resistance_ohm * (1 - least),
    device.voltage_V[m]!,
  )
}
