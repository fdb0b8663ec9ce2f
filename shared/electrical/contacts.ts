import type { ResolvedConnector, ResolvedJoint } from '../build/resolve.ts'
import type { ConnectorType } from '../catalog/connectorType.ts'
import type { Model } from '../catalog/model.ts'
import type { Line } from '../quantity/rails.ts'
import { gaugesAtConnectors } from './conductors.ts'
import { lineIndex } from './lines.ts'
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

type ByGauge = Map<number, ContactFigures>
/** What was read of a pair of connector types, and of a model's wires: neither changes. */
const mated = new WeakMap<ConnectorType, WeakMap<ConnectorType, ByGauge>>()
const gauges = new WeakMap<Model, ReadonlyMap<string, readonly number[]>>()

/**
 * Reads one contact of a joint. Its rating depends on the wire crimped into it: where the connector type lists ratings
 * by gauge, the thinnest wire on either side of the joint decides.
 */
export function readContact({ a, b }: ResolvedJoint, line: Line): ContactFigures {
  const gauge = Math.max(gaugeAt(a, line), gaugeAt(b, line))
  let withB = mated.get(a.type)
  if (!withB) mated.set(a.type, (withB = new WeakMap()))
  let byGauge = withB.get(b.type)
  if (!byGauge) withB.set(b.type, (byGauge = new Map()))
  let figures = byGauge.get(gauge)
  if (!figures) byGauge.set(gauge, (figures = readPair(a.type, b.type, gauge)))
  return figures
}

function readPair(a: ConnectorType, b: ConnectorType, gauge: number): ContactFigures {
  const ofA = readRating(a, gauge)
  const ofB = readRating(b, gauge)
  const a_A = ofA?.value ?? Infinity
  const b_A = ofB?.value ?? Infinity
  const weaker = a_A === b_A ? 'alike' : a_A < b_A ? 'a' : 'b'
  const one = readResistance(a)
  const other = readResistance(b)
  return {
    new_ohm: Math.max(one.new_ohm, other.new_ohm),
    aged_ohm: Math.max(one.aged_ohm, other.aged_ohm),
    rating: weaker === 'b' ? ofB : ofA,
    weaker,
    about: one.about || other.about,
  }
}

/** Thinnest wire of the part at this connector; -1 where its wires are not given. */
function gaugeAt({ part, connector }: ResolvedConnector, line: Line): number {
  let ofModel = gauges.get(part.model)
  if (!ofModel) gauges.set(part.model, (ofModel = gaugesAtConnectors(part.model)))
  return ofModel.get(connector.id)?.[lineIndex[line]] ?? -1
}

function readResistance({ power }: ConnectorType): { new_ohm: number; aged_ohm: number; about: boolean } {
  const { initial, endOfLife } = power!.contactResistance_mohm
  const fresh = takeSize(initial, worstNew_mohm)
  const aged = takeSize(endOfLife, Math.max(worstAged_mohm, fresh.value))
  return { new_ohm: fresh.value / 1000, aged_ohm: aged.value / 1000, about: fresh.about }
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
