import type { ResolvedConnector, ResolvedJoint } from '../build/resolve.ts'
import type { ConnectorType } from '../catalog/connectorType.ts'
import type { Model } from '../catalog/model.ts'
import type { Line } from '../quantity/rails.ts'
import { gaugeKey, gaugesAtConnectors } from './conductors.ts'
import { takeLimit, takeSize, type Taken } from './figures.ts'

/** One mated contact of a joint: resistance new and aged, and what it may carry. */
export interface ContactFigures {
  /** Of one contact. */
  new_ohm: number
  aged_ohm: number
  /** Of one contact; null where no rating is known. */
  rating: Taken | null
  /** Side whose rating is lower. */
  weaker: 'a' | 'b' | 'alike'
  about: boolean
}

/** Stand in where a contact resistance is unknown: the initial and aged limits of a SATA power contact [S31]. */
const worstNew_mohm = 30
const worstAged_mohm = 45

/**
 * Reads contacts. A contact's rating depends on the wire crimped into it: where the connector type lists ratings by
 * gauge, the thinnest wire on either side of the joint decides.
 */
export class ContactReader {
  readonly #gauges = new Map<Model, ReadonlyMap<string, number>>()
  readonly #ratings = new Map<ConnectorType, Map<number, Taken | null>>()
  readonly #resistances = new Map<ConnectorType, { new_ohm: number; aged_ohm: number; about: boolean }>()

  read({ a, b }: ResolvedJoint, line: Line): ContactFigures {
    const gauge = Math.max(this.#gaugeAt(a, line), this.#gaugeAt(b, line))
    const ofA = this.#rating(a.type, gauge)
    const ofB = this.#rating(b.type, gauge)
    const a_A = ofA?.value ?? Infinity
    const b_A = ofB?.value ?? Infinity
    const weaker = a_A === b_A ? 'alike' : a_A < b_A ? 'a' : 'b'
    const one = this.#resistance(a.type)
    const other = this.#resistance(b.type)
    return {
      new_ohm: Math.max(one.new_ohm, other.new_ohm),
      aged_ohm: Math.max(one.aged_ohm, other.aged_ohm),
      rating: weaker === 'b' ? ofB : ofA,
      weaker,
      about: one.about || other.about,
    }
  }

  /** Thinnest wire of the part at this connector; -1 where its wires are not given. */
  #gaugeAt({ part, connector }: ResolvedConnector, line: Line): number {
    let gauges = this.#gauges.get(part.model)
    if (!gauges) this.#gauges.set(part.model, (gauges = gaugesAtConnectors(part.model)))
    return gauges.get(gaugeKey(connector.id, line)) ?? -1
  }

  #rating(type: ConnectorType, gauge: number): Taken | null {
    let byGauge = this.#ratings.get(type)
    if (!byGauge) this.#ratings.set(type, (byGauge = new Map()))
    let rating = byGauge.get(gauge)
    if (rating === undefined) byGauge.set(gauge, (rating = readRating(type, gauge)))
    return rating
  }

  #resistance(type: ConnectorType): { new_ohm: number; aged_ohm: number; about: boolean } {
    let read = this.#resistances.get(type)
    if (!read) {
      const { initial, endOfLife } = type.power!.contactResistance_mohm
      const fresh = takeSize(initial, worstNew_mohm)
      const aged = takeSize(endOfLife, Math.max(worstAged_mohm, fresh.value))
      read = { new_ohm: fresh.value / 1000, aged_ohm: aged.value / 1000, about: fresh.about }
      this.#resistances.set(type, read)
    }
    return read
  }
}

/** Rating of one contact with a wire of this gauge: the next thinner listed gauge, the thinnest where none is. */
function readRating({ name, power }: ConnectorType, gauge: number): Taken | null {
  if (!power) return null
  const listed = power.ratingByWire
  if (gauge < 0 || !listed || listed.length === 0)
    return takeLimit(power.rating_A, `rating of one contact, ${name}`, 'A')
  const byGauge = [...listed].sort((first, second) => first.awg - second.awg)
  const row = byGauge.find(({ awg }) => awg >= gauge) ?? byGauge.at(-1)!
  const taken = takeLimit(row.rating_A, `rating of one contact with ${row.awg} AWG, ${name}`, 'A')
  return taken && row.awg < gauge ? { ...taken, about: true } : taken
}
