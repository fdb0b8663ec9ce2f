import type { Conductor, Model } from '../catalog/model.ts'
import type { Settings } from '../build/document.ts'
import { chassisAmpacity } from './ampacity.ts'
import { awgArea_mm2, gaugeOfArea, wireResistance_ohm } from './copper.ts'
import { takeLimit, takeSize, type Taken } from './figures.ts'
import { lineIndex, lineName } from './lines.ts'

/** Resistance and limit of one conductor of a model. */
export interface ConductorFigures {
  resistance_ohm: number
  /** Of the whole conductor; null for board planes and wires whose gauge is not known. */
  limit: Taken | null
  about: boolean
}

/** Stands in where a length is unknown: longer than any lead in a case. */
const worstLength_mm = 1500
/** Stands in where a plane's resistance is unknown. */
const worstPlane_mohm = 5

/** Gauge by which tables are read; undefined for planes. */
export function gaugeOf(conductor: Conductor): number | undefined {
  if (conductor.awg !== undefined) return conductor.awg
  const area = conductor.area_mm2?.value ?? conductor.area_mm2?.low
  return area === undefined || area === null ? undefined : gaugeOfArea(area)
}

/** Reads a conductor under the build's settings: temperature for its resistance, bundling for its ampacity. */
export function readConductor(conductor: Conductor, settings: Settings): ConductorFigures {
  const resistance = resistanceOf(conductor, settings.wireTemperature_C)
  return { resistance_ohm: resistance.value, about: resistance.about, limit: limitOf(conductor, settings) }
}

function resistanceOf(conductor: Conductor, temperature_C: number): { value: number; about: boolean } {
  if (conductor.resistance_mohm) {
    const { value, about } = takeSize(conductor.resistance_mohm, worstPlane_mohm)
    return { value: value / 1000, about }
  }
  const length = conductor.length_mm
    ? takeSize(conductor.length_mm, worstLength_mm)
    : { value: worstLength_mm, about: true }
  const gauge = gaugeOf(conductor)
  const stated = conductor.area_mm2?.value ?? conductor.area_mm2?.low
  const area = conductor.awg !== undefined ? awgArea_mm2(conductor.awg) : stated
  if (!area || gauge === undefined)
    return { value: wireResistance_ohm(length.value, awgArea_mm2(24), conductor.wires, temperature_C), about: true }
  return { value: wireResistance_ohm(length.value, area, conductor.wires, temperature_C), about: length.about }
}

function limitOf(conductor: Conductor, settings: Settings): Taken | null {
  if (conductor.ampacity_A)
    return takeLimit(conductor.ampacity_A, `ampacity of the ${lineName[conductor.line]} conductor`, 'A')
  const gauge = gaugeOf(conductor)
  if (gauge === undefined) return null
  const { ampere, fromMemory } = chassisAmpacity(gauge)
  const value = ampere * settings.bundleFactor * conductor.wires
  return {
    value,
    low: value,
    high: value,
    about: false,
    figure: {
      what: `chassis ampacity of ${gauge} AWG, one wire in free air`,
      value: ampere,
      unit: 'A',
      origin: 'standard',
      source: 'S57',
      ...(fromMemory ? { fromMemory } : {}),
    },
  }
}

/** Thinnest wire at each connector of a model, by line; -1 on lines where no gauge is given. */
export function gaugesAtConnectors(model: Model): ReadonlyMap<string, readonly number[]> {
  const thinnest = new Map<string, number[]>()
  for (const conductor of model.wiring) {
    const gauge = gaugeOf(conductor)
    if (gauge === undefined) continue
    const line = lineIndex[conductor.line]
    for (const end of [conductor.from, conductor.to]) {
      const byLine = thinnest.get(end) ?? [-1, -1, -1, -1]
      byLine[line] = Math.max(gauge, byLine[line]!)
      thinnest.set(end, byLine)
    }
  }
  return thinnest
}
