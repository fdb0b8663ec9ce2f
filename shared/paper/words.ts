import type { Model } from '../catalog/model.ts'
import type { Quantity } from '../quantity/quantity.ts'

/* Short words for small places: tags, rows, labels. Full names stand in the parts list. */

/** A figure without trailing zeros; "about" where nothing better than a guess is known. */
export function shortNumber(value: number): string {
  return String(Math.round(value * 100) / 100)
}

const known = (quantity: Quantity | undefined): number | undefined => quantity?.value ?? undefined

const protocolNames = { sata: 'SATA', sas: 'SAS', nvme: 'NVMe' } as const

/** "3 TB SAS, 7200 rpm" */
export function driveWords(model: Model): string {
  const { drive } = model
  if (!drive) return model.name
  const capacity = known(drive.capacity_TB)
  const size =
    capacity === undefined ? '' : capacity < 1 ? `${Math.round(capacity * 1000)} GB ` : `${shortNumber(capacity)} TB `
  const motor = drive.rotation_rpm > 0 ? `, ${drive.rotation_rpm} rpm` : ' SSD'
  return `${size}${protocolNames[drive.protocol]}${motor}`
}

const railWords = { '12V': '12 V', '5V': '5 V', '3.3V': '3.3 V' } as const

/** Rails, shared groups and total of a supply, one line each, as "12 V 54 A". At most `most` lines. */
export function supplyLines(model: Model, most: number): string[] {
  const { supply } = model
  if (!supply) return []
  const several = new Map<string, number>()
  for (const { rail } of supply.rails) several.set(rail, (several.get(rail) ?? 0) + 1)
  const seen = new Map<string, number>()
  const rails = supply.rails.map(({ rail, limit_A }) => {
    const number = (seen.get(rail) ?? 0) + 1
    seen.set(rail, number)
    const name = (several.get(rail) ?? 0) > 1 ? `${railWords[rail]} #${number}` : railWords[rail]
    const limit = known(limit_A)
    return `${name}: ${limit === undefined ? 'unknown' : `${shortNumber(limit)} A`}`
  })
  const railOf = new Map(supply.rails.map(({ id, rail }) => [id, rail]))
  const groups = supply.groups.flatMap(({ rails: ids, limit_W, limit_A }) => {
    const names = [...new Set(ids.flatMap((id) => railOf.get(id) ?? []))].map((rail) => railWords[rail])
    const name = names.length === 1 ? `${names[0]} in all` : names.join(' + ')
    const watts = known(limit_W)
    const amperes = known(limit_A)
    if (watts !== undefined) return [`${name}: ${shortNumber(watts)} W`]
    return amperes === undefined ? [] : [`${name}: ${shortNumber(amperes)} A`]
  })
  const lines = [...rails, ...groups]
  return lines.length <= most ? lines : [...lines.slice(0, most - 1), `and ${lines.length - most + 1} more limits`]
}

/** The end of a serial number, which is what a person can read on a drive in its bay. */
export const serialTail = (serial: string): string => (serial.length > 4 ? `…${serial.slice(-4)}` : serial)

/** "1 outlet left", "3 outlets left" */
export const counted = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

/** Kind words that a tag need not repeat: its place and its connectors say them. */
const kindWords = /^(breakout|cable|splitter|adapter|backplane|controller|expander|fan), /i

/** Name of a part for its tag: its own, else the model's without the kind. */
export function tagWords(name: string | undefined, model: Model): string {
  if (name) return name
  const short = model.name.replace(kindWords, '')
  return short.charAt(0).toUpperCase() + short.slice(1)
}
