import { connectorName } from '../../build/edits/words.ts'
import type { ResolvedBuild, ResolvedConnector, ResolvedPart } from '../../build/resolve.ts'
import type { ModelKind } from '../../catalog/model.ts'
import { carriesData } from '../../layout/carries.ts'
import { farEnds, partnersOf, placesWords } from './farEnds.ts'
import type { Label, LabelLine } from './label.ts'

const cableKinds: ReadonlySet<ModelKind> = new Set(['lead', 'splitter', 'breakout', 'cable'])

/** A part with wires that hang free gets a label at each end. An adapter without a wire has nothing to stick it on. */
export const isCable = ({ model }: ResolvedPart): boolean =>
  cableKinds.has(model.kind) ||
  (model.kind === 'adapter' && model.wiring.some((conductor) => conductor.length_mm !== undefined))

/** Whether anything is plugged into a part. */
export const isInUse = (part: ResolvedPart): boolean => part.connectors.some(({ joints }) => joints.length > 0)

/** One label for each end of every cable that is in use, and for each plug of a supply's fixed leads. */
export function cableLabels(build: ResolvedBuild): Label[] {
  return build.parts.flatMap((part) => {
    if (part.model.supply) return fixedEnds(part).map(fixedLabel)
    return isCable(part) && isInUse(part) ? part.connectors.map(endLabel) : []
  })
}

/** Plugs of leads that are fixed to their supply; sockets for modular leads have no wire of their own. */
function fixedEnds(supply: ResolvedPart): ResolvedConnector[] {
  if (supply.model.supply?.toleranceAt !== 'lead-end') return []
  return supply.connectors.filter(({ type, joints }) => !type.id.startsWith('modular-') && joints.length > 0)
}

const labelOf = (end: ResolvedConnector, lines: LabelLine[]): Label => ({
  id: `${end.part.part.id}#${end.connector.id}`,
  group: carriesData(end) ? 'data' : 'power',
  name: connectorName(end),
  lines,
  isJoined: end.joints.length > 0,
})

const heading = (text: string): LabelLine => ({ text, weight: 700, scale: 1.15 })
const statement = (text: string): LabelLine => ({ text, weight: 400, scale: 1 })

const hereLine = (end: ResolvedConnector): LabelLine => ({
  text: `here: ${placesWords(partnersOf(end))}`,
  weight: 600,
  scale: 1,
})

function fixedLabel(end: ResolvedConnector): Label {
  return labelOf(end, [heading(connectorName(end)), hereLine(end), statement(`far end: ${end.part.part.ref}, fixed`)])
}

function endLabel(end: ResolvedConnector): Label {
  const { data, power } = farEnds(end)
  const [first, second] = data.length > 0 ? [data, power] : [power, []]
  return labelOf(end, [
    heading(connectorName(end)),
    hereLine(end),
    statement(`far end: ${farWords(first)}${second.length > 0 ? `; power: ${farWords(second)}` : ''}`),
  ])
}

/** What the other ends are plugged into; an end that hangs free is named by itself. */
function farWords(ends: readonly ResolvedConnector[]): string {
  const partners = ends.flatMap(partnersOf)
  if (partners.length > 0) return placesWords(partners)
  return ends.length === 1 && ends[0] ? `${ends[0].connector.label}, free` : 'free'
}
