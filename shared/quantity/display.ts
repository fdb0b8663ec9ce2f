import { awgArea_mm2, gaugeOfArea } from '../electrical/copper.ts'
import type { Quantity } from './quantity.ts'
import type { Line } from './rails.ts'

/** Units as they are written beside a figure. */
export type Unit = 'A' | 'W' | 'V' | 'VA' | 'mm' | 'in' | 'mm²' | 'mΩ' | 'TB' | 'Gb/s' | 'MB/s' | 's' | 'h' | '%' | ''

/** Rails and the return as they are written in a sentence or a table. */
export const lineNames: Readonly<Record<Line, string>> = {
  '12V': '12\u00a0V',
  '5V': '5\u00a0V',
  '3.3V': '3.3\u00a0V',
  return: 'return',
}

/** Four digits say more than any datasheet holds; fewer where the figure has fewer. */
export function formatNumber(value: number, locale?: string): string {
  const digits = Math.abs(value) >= 1000 ? { maximumFractionDigits: 0 } : { maximumSignificantDigits: 4 }
  return new Intl.NumberFormat(locale, digits).format(value)
}

/** A number with its unit, held together by a space that does not break. */
export function formatFigure(value: number, unit: Unit, locale?: string): string {
  return unit === '' ? formatNumber(value, locale) : `${formatNumber(value, locale)}\u00a0${unit}`
}

/** True where the figure must be read with "about": guessed, a class's default, or from memory. */
export const isAbout = (quantity: Quantity): boolean =>
  quantity.origin === 'guess' || quantity.origin === 'class default' || quantity.fromMemory === true

/** "1.7 to 2.2 A" where a range is stated and says more than the value. */
export function formatRange(quantity: Quantity, unit: Unit, locale?: string): string | undefined {
  const { low, high } = quantity
  if (low === undefined && high === undefined) return undefined
  if (low === undefined) return `up to ${formatFigure(high!, unit, locale)}`
  if (high === undefined) return `from ${formatFigure(low, unit, locale)}`
  return low === high ? undefined : `${formatNumber(low, locale)} to ${formatFigure(high, unit, locale)}`
}

export const millimetresPerInch = 25.4

/** Lengths and areas in another unit: value and range are turned, the origin stays. */
export function scaleQuantity(quantity: Quantity, factor: number): Quantity {
  const scaled: Quantity = { ...quantity, value: quantity.value === null ? null : quantity.value * factor }
  if (quantity.low !== undefined) scaled.low = quantity.low * factor
  if (quantity.high !== undefined) scaled.high = quantity.high * factor
  return scaled
}

/** Wire size in both manners, the preferred one first: "18 AWG (0.823 mm²)". A given area has no exact gauge. */
export function formatWire(
  wire: { awg?: number; area_mm2?: number | null },
  first: 'awg' | 'mm2',
  locale?: string,
): string | undefined {
  const exact = wire.awg !== undefined
  const area = exact ? awgArea_mm2(wire.awg!) : wire.area_mm2
  if (area == null) return undefined
  const areaWords = `${Number(area.toPrecision(3)).toLocaleString(locale)}\u00a0mm²`
  const gaugeWords = `${exact ? wire.awg : `about ${gaugeOfArea(area)}`}\u00a0AWG`
  return first === 'awg' ? `${gaugeWords} (${areaWords})` : `${areaWords} (${gaugeWords})`
}
