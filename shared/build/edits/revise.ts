import type { Quantity } from '../../quantity/quantity.ts'
import type { Finding } from '../../check/result.ts'
import type { Change, PartPatch } from '../changes.ts'
import { refSchema, type BuildDocument, type Settings } from '../document.ts'
import { outcome, refuse, type EditOutcome } from './outcome.ts'
import { refList } from './words.ts'

const partOf = (document: BuildDocument, id: string) => document.parts.find((part) => part.id === id)

/** Fields of a part that the inspector edits, with the word for each in labels. */
const fieldWords: Readonly<Partial<Record<keyof PartPatch, string>>> = {
  model: 'model',
  name: 'name',
  serial: 'serial',
  wwn: 'WWN',
  makerModel: 'maker’s model',
  role: 'role',
  mode: 'mode',
  note: 'note',
  routes_mm: 'routes',
  pinTest: 'pin test',
}

/** Sets fields of one part. A changed model voids its pin test and drops own figures that belong to the old one. */
export function patchPart(document: BuildDocument, id: string, patch: PartPatch): EditOutcome {
  const part = partOf(document, id)
  if (!part) return refuse('That part is no longer there.')
  const changed = Object.fromEntries(
    Object.entries(patch).filter(([field, value]) => (part[field as keyof PartPatch] ?? null) !== value),
  ) as PartPatch
  const words = Object.keys(changed).map((field) => fieldWords[field as keyof PartPatch] ?? field)
  if (words.length === 0) return refuse('Nothing would change.')
  const follow: PartPatch = changed.model === undefined ? {} : { pinTest: null, overrides: null }
  return outcome(`Change ${words.join(' and ')} of ${part.ref}`, [
    { op: 'updatePart', id, patch: { ...follow, ...changed } },
  ])
}

/** Gives a part another reference designation. Taken ones and malformed ones are refused. */
export function renameRef(document: BuildDocument, id: string, ref: string): EditOutcome {
  const part = partOf(document, id)
  if (!part) return refuse('That part is no longer there.')
  const next = ref.trim().toUpperCase()
  if (next === part.ref) return refuse('Nothing would change.')
  const parsed = refSchema.safeParse(next)
  if (!parsed.success) return refuse(`"${ref.trim()}" is no designation: use a class letter and a number, as "W6".`)
  const other = document.parts.find((candidate) => candidate.ref === next)
  if (other) return refuse(`${next} is taken. Names on tape never stand for two parts.`)
  return outcome(`Rename ${part.ref} to ${next}`, [{ op: 'updatePart', id, patch: { ref: next } }])
}

/** Sets a part's own figure over its model's, or takes it back (`null`). */
export function overrideFigure(
  document: BuildDocument,
  id: string,
  path: string,
  figure: Quantity | null,
  what = path,
): EditOutcome {
  const part = partOf(document, id)
  if (!part) return refuse('That part is no longer there.')
  const { [path]: before, ...others } = part.overrides ?? {}
  if (figure === null && before === undefined) return refuse('There is no own figure to take back.')
  const next = figure === null ? others : { ...others, [path]: figure }
  const label =
    figure === null ? `Take back own figure of ${part.ref}: ${what}` : `Set own figure of ${part.ref}: ${what}`
  return outcome(label, [{ op: 'updatePart', id, patch: { overrides: Object.keys(next).length === 0 ? null : next } }])
}

/** Puts parts at new places on the sheet: the end of a drag. */
export function moveParts(
  document: BuildDocument,
  places: ReadonlyMap<string, { x: number; y: number } | null>,
  label?: string,
): EditOutcome {
  const moved = document.parts.filter((part) => places.has(part.id))
  const changes: Change[] = moved.flatMap((part): Change[] => {
    const to = places.get(part.id) ?? null
    const same = part.position === undefined ? to === null : part.position.x === to?.x && part.position.y === to.y
    return same ? [] : [{ op: 'updatePart', id: part.id, patch: { position: to } }]
  })
  return outcome(label ?? `Move ${refList(moved.map((part) => part.ref))}`, changes)
}

export function changeSettings(document: BuildDocument, settings: Settings): EditOutcome {
  if (JSON.stringify(settings) === JSON.stringify(document.settings)) return refuse('Nothing would change.')
  return outcome('Change build settings', [{ op: 'updateSettings', settings }])
}

export function renameBuild(document: BuildDocument, name: string, machine: string | null): EditOutcome {
  const to = name.trim()
  if (to === '') return refuse('Give the build a name.')
  if (to === document.name && machine === (document.machine ?? null)) return refuse('Nothing would change.')
  return outcome(`Rename build to ${to}`, [{ op: 'rename', name: to, machine }])
}

/** Accepts a finding with a reason. It comes back when its numbers get worse. */
export function acceptFinding(finding: Finding, reason: string, by: string, on: string): EditOutcome {
  if (reason.trim() === '') return refuse('Write why it can stay: the reason shows in review and on the papers.')
  const named = finding.subjects.filter((subject) => subject.ref !== undefined)
  const ref = (named.find((subject) => subject.kind !== 'joint') ?? named[0])?.ref
  return outcome(`Accept ${finding.rule}${ref === undefined ? '' : ` on ${ref}`}`, [
    {
      op: 'acceptFinding',
      accepted: {
        key: finding.key,
        reason: reason.trim(),
        by,
        on,
        severity: finding.severity,
        ...(finding.load !== undefined && { load: finding.load }),
      },
    },
  ])
}

export function withdrawAcceptance(document: BuildDocument, key: string): EditOutcome {
  if (!document.accepted.some((accepted) => accepted.key === key)) return refuse('It is not accepted.')
  return outcome('Withdraw an acceptance', [{ op: 'withdrawAcceptance', key }])
}
