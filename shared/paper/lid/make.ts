import { compareRefs } from '../../build/refOrder.ts'
import type { ResolvedBuild, ResolvedPart } from '../../build/resolve.ts'
import type { CheckResult } from '../../check/result.ts'
import { severityRank } from '../../check/severity.ts'
import { counted } from '../../check/words.ts'
import type { ReviewState } from '../../contract/reviewState.ts'
import { carriesPower, outletsOf } from '../../layout/carries.ts'
import { checkedWords } from '../../review/words.ts'
import { refRanges } from '../diagram/partsBlock.ts'
import { withinLimits } from '../diagram/titleBlock.ts'
import { dataPathWords } from '../dataWays.ts'
import { powerWays, powerWords, wayWords } from '../powerWays.ts'
import { driveWords, serialTail } from '../words.ts'
import { budgetsOf, startMomentWords } from './budgets.ts'
import type { LidContent, LidDrive, LidFeed, LidFinding, ViewName } from './content.ts'
import { mapsOf } from './maps.ts'
import { startGroupsOf } from './startGroups.ts'

export interface LidInput {
  build: ResolvedBuild
  result: CheckResult
  /** A number, or words where it was never saved. */
  revision: number | string
  /** As it shall be printed. */
  date: string
  review: ReviewState | null
  seenFrom?: ViewName | undefined
  contact: string
  address: string
}

/** Everything a lid sheet says about a build, in words. */
export function lidContent(input: LidInput): LidContent {
  const { build, result, revision, date, review, contact, address } = input
  const { name, machine = '' } = build.document
  const drives = drivesOf(build, result)
  const byId = new Map(drives.map(({ id, drive }) => [id, drive]))
  const limits = withinLimits(result)
  const findings = [...result.findings].sort((a, b) => severityRank[a.severity] - severityRank[b.severity])
  const isKnown = typeof revision === 'number'
  return {
    name,
    machine,
    summary: summaryOf(build),
    revision: String(revision),
    date,
    checked: isKnown ? checkedWords(review, revision) : 'not reviewed',
    checkedBy: isKnown && review?.approval?.revision === revision ? namesOf(review) : '',
    within: limits.words,
    isWithin: limits.isWithin,
    weakestHop: result.weakestHop ?? '',
    maps: mapsOf(build, byId, input.seenFrom),
    drives: drives.map(({ drive }) => drive),
    feeds: feedsOf(build),
    budgets: budgetsOf(build, result),
    startMoments: startMomentWords(result),
    startGroups: startGroupsOf(build, result),
    open: findings.filter(({ accepted }) => !accepted).map(findingOf),
    accepted: findings.filter(({ accepted }) => accepted).map(findingOf),
    assumed: assumedOf(drives, result),
    contact: contact.trim(),
    address: address.trim(),
  }
}

const namesOf = ({ approval }: ReviewState): string => (approval?.by ?? []).map(({ name }) => name).join(', ')

function summaryOf(build: ResolvedBuild): string {
  const of = (kind: string) => build.parts.filter(({ model }) => model.kind === kind)
  const bays = of('case').reduce((sum, { model }) => sum + model.bays.length, 0)
  const byName = new Map<string, string[]>()
  for (const { part, model } of of('supply')) {
    const words = part.name ?? model.name
    byName.set(words, [...(byName.get(words) ?? []), part.ref])
  }
  const supplies = [...byName].map(([words, refs]) => `${refRanges(refs)} ${words}`)
  return [
    ...(bays > 0 ? [counted(bays, 'bay')] : []),
    counted(of('drive').length, 'drive'),
    ...(supplies.length > 3 ? [counted(supplies.length, 'supply', 'supplies')] : supplies),
  ].join(' · ')
}

function drivesOf(build: ResolvedBuild, result: CheckResult): { id: string; drive: LidDrive }[] {
  const cases = build.parts.filter(({ model }) => model.kind === 'case')
  return build.parts
    .filter(({ model }) => model.kind === 'drive')
    .sort((a, b) => placeOf(a, cases) - placeOf(b, cases) || compareRefs(a.part.ref, b.part.ref))
    .map((drive) => ({ id: drive.part.id, drive: driveOf(build, result, drive, cases.length > 1) }))
}

/** Order on the sheet: case by case, bay by bay, drives without a bay last. */
function placeOf({ part }: ResolvedPart, cases: readonly ResolvedPart[]): number {
  const holder = cases.findIndex((one) => one.part.id === part.bay?.case)
  return holder < 0 || !part.bay ? Number.MAX_SAFE_INTEGER : holder * 1000 + part.bay.slot
}

function driveOf(build: ResolvedBuild, result: CheckResult, drive: ResolvedPart, withCase: boolean): LidDrive {
  const { part, model } = drive
  const ways = powerWays(drive)
  const power = powerWords(ways)
  const data = dataPathWords(build, result.dataPaths, drive)
  const holder = part.bay ? build.partById.get(part.bay.case) : undefined
  const bay = holder && part.bay ? String(part.bay.slot).padStart(2, '0') : ''
  const serial = part.serial?.trim() ?? ''
  return {
    ref: part.ref,
    bay: withCase && holder ? `${holder.part.ref} ${bay}` : bay,
    serial: serial || 'not recorded',
    tail: serial ? serialTail(serial) : 'no serial',
    capacity: capacityOf(drive),
    role: part.role ?? '',
    model: part.name ?? model.name,
    power: power || 'not fed',
    data: data || 'no data path',
    powerIsOpen: !ways.some(({ from }) => from === 'supply'),
    dataIsOpen: !result.dataPaths.some((path) => path.works && path.drive === part.id),
  }
}

/** "3 TB SAS"; what is not known is said. */
function capacityOf({ model }: ResolvedPart): string {
  const capacity = model.drive?.capacity_TB
  const words = driveWords(model).split(',')[0] ?? ''
  if (capacity?.value === null) return `? TB ${words}`
  return capacity?.origin === 'guess' ? `about ${words}` : words
}

/** What feeds each inlet of the backplanes, since several work together there. */
function feedsOf(build: ResolvedBuild): LidFeed[] {
  return build.parts
    .filter(({ model }) => model.kind === 'backplane')
    .flatMap((plane) => {
      const outlets = outletsOf(plane)
      return plane.connectors
        .filter((one) => carriesPower(one) && !outlets.has(one.connector.id))
        .map((inlet) => {
          const ways = powerWays({ ...plane, connectors: [inlet] })
          const words = ways.map(wayWords).join(' and ')
          return { inlet: `${plane.part.ref} ${inlet.connector.label}`, power: words || 'nothing plugged in' }
        })
    })
}

const findingOf = ({ severity, message, accepted }: CheckResult['findings'][number]): LidFinding => ({
  severity,
  message,
  accepted: accepted ? `Accepted by ${accepted.by || 'somebody'} on ${accepted.on}: ${accepted.reason}` : '',
})

function assumedOf(drives: readonly { drive: LidDrive }[], result: CheckResult): string[] {
  const unread = drives.filter(({ drive }) => drive.tail === 'no serial').map(({ drive }) => drive.ref)
  const abouts = result.ledger.some(({ about }) => about)
  return [
    ...(unread.length > 0 ? [`No serial is on record for ${unread.join(', ')}.`] : []),
    ...(abouts ? ['“About” stands before what rests on an unknown or guessed figure.'] : []),
  ]
}
