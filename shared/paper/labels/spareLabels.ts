import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import { refRanges } from '../diagram/partsBlock.ts'
import { cableLabels, isCable, isInUse } from './cableLabels.ts'
import type { Label, LabelLine } from './label.ts'
import { trayLabels } from './trayLabels.ts'

/** Parts with wires that the build holds and does not use. */
export const spareCables = (build: ResolvedBuild): ResolvedPart[] =>
  build.parts.filter((part) => isCable(part) && !isInUse(part))

/**
 * Labels for the bags of spare leads: one a pinout family, because a lead in the wrong bag destroys drives, and one for
 * everything that fits any supply.
 */
export function spareLabels(build: ResolvedBuild): Label[] {
  const bags = new Map<string, ResolvedPart[]>()
  for (const part of spareCables(build)) {
    const bag = bagOf(part)
    bags.set(bag, [...(bags.get(bag) ?? []), part])
  }
  return [...bags].map(([bag, parts]) => ({
    id: `spare:${bag}`,
    group: 'spare',
    name: nameOf(bag),
    lines: linesOf(build, bag, parts),
    isJoined: false,
  }))
}

const anySupply = 'any supply'
const unknownFamily = 'family not known'

const bagOf = ({ model }: ResolvedPart): string =>
  model.kind === 'lead' ? (model.pinoutFamily ?? unknownFamily) : anySupply

const nameOf = (bag: string): string => (bag === anySupply ? 'Spare cables' : `Spare leads, ${bag}`)

function linesOf(build: ResolvedBuild, bag: string, parts: readonly ResolvedPart[]): LabelLine[] {
  const machine = build.document.machine ?? build.document.name
  const refsByModel = new Map<string, string[]>()
  for (const { part, model } of parts) refsByModel.set(model.name, [...(refsByModel.get(model.name) ?? []), part.ref])
  return [
    { text: nameOf(bag), weight: 700, scale: 1.25 },
    { text: machine, weight: 600, scale: 1 },
    ...(bag === anySupply ? [] : [{ text: familyWarning(build, bag), weight: 700 as const, scale: 1 }]),
    ...[...refsByModel].map(([name, refs]): LabelLine => ({
      text: `${refRanges(refs)}: ${name}`,
      weight: 400,
      scale: 1,
    })),
  ]
}

function familyWarning(build: ResolvedBuild, family: string): string {
  if (family === unknownFamily) return 'Measure every pin before use: nobody knows which supply these belong to.'
  const own = build.parts
    .filter(({ model }) => model.supply && model.pinoutFamily === family)
    .map(({ part }) => part.ref)
  const only =
    own.length > 0 ? `Only for ${refRanges(own)} and supplies of ${family}.` : `Only for supplies of ${family}.`
  return `${only} On any other, a plug that fits may destroy every drive.`
}

/** Every label of a build: cable ends in the order of the parts, trays in the order of the bays, bags last. */
export const labelsOf = (build: ResolvedBuild): Label[] => [
  ...cableLabels(build),
  ...trayLabels(build),
  ...spareLabels(build),
]
