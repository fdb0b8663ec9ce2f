import type { Model } from '../catalog/model.ts'
import type { Quantity } from '../quantity/quantity.ts'
import { compareFigures, type FigureDifference } from './compareFigures.ts'
import { compareJoints, type JointDifference } from './compareJoints.ts'
import type { AcceptedFinding, BuildDocument, Part, Purchase } from './document.ts'
import { same } from './same.ts'

/** Fields of a part that are told with their value before and after. */
export const toldFields = ['ref', 'model', 'name', 'serial', 'wwn', 'makerModel', 'role', 'mode', 'note'] as const
export type ToldField = (typeof toldFields)[number]

/** A bay by the designation of its case. */
export interface Place {
  case: string
  slot: number
}

/** One thing that differs between two states of a build. Parts are named by the designation that they have now. */
export type Difference =
  | { kind: 'part added'; part: string; ref: string; model: string }
  | { kind: 'part removed'; part: string; ref: string; model: string }
  | { kind: 'part moved'; part: string; ref: string; from: Place | null; to: Place | null }
  | { kind: 'part changed'; part: string; ref: string; field: ToldField; from: string | null; to: string | null }
  | { kind: 'figure changed'; part: string; ref: string; path: string; from: Quantity | null; to: Quantity | null }
  | { kind: 'routes changed'; part: string; ref: string }
  | { kind: 'pin test changed'; part: string; ref: string; to: Part['pinTest'] | null }
  | { kind: 'setting changed'; path: string; from: string; to: string }
  | { kind: 'model added' | 'model removed'; model: string; name: string }
  /** With the figures that differ; empty where something else of the model does. */
  | { kind: 'model changed'; model: string; name: string; figures: FigureDifference[] }
  | { kind: 'finding accepted' | 'acceptance withdrawn'; key: string; reason: string }
  | { kind: 'purchase changed'; line: string; from: Purchase | null; to: Purchase | null }
  | { kind: 'build renamed'; field: 'name' | 'machine'; from: string; to: string }
  | JointDifference

/** What may be known beyond the documents themselves. */
export interface CompareOptions {
  /** Parts of which one says that they moved from one plug to another, and not the plug: drives. */
  travels?: (part: string) => boolean
}

/**
 * What changed between two states of one build, by meaning: parts, joints, figures, places, settings. Where things are
 * drawn and in which order they are listed does not count.
 */
export function compareBuilds(
  before: BuildDocument,
  after: BuildDocument,
  { travels }: CompareOptions = {},
): Difference[] {
  return [
    ...compareNames(before, after),
    ...compareSettings(before.settings, after.settings, ''),
    ...compareParts(before, after),
    ...compareJoints(before, after, travels),
    ...compareModels(before.models, after.models),
    ...compareAccepted(before.accepted, after.accepted),
    ...comparePurchases(before.purchases ?? [], after.purchases ?? []),
  ]
}

function compareNames(before: BuildDocument, after: BuildDocument): Difference[] {
  return (['name', 'machine'] as const).flatMap((field): Difference[] => {
    const [from, to] = [before[field] ?? '', after[field] ?? '']
    return from === to ? [] : [{ kind: 'build renamed', field, from, to }]
  })
}

function compareSettings(before: object, after: object, path: string): Difference[] {
  const [old, now] = [before as Record<string, unknown>, after as Record<string, unknown>]
  return [...new Set([...Object.keys(old), ...Object.keys(now)])].flatMap((name): Difference[] => {
    const [from, to] = [old[name], now[name]]
    const at = path === '' ? name : `${path}.${name}`
    if (typeof from === 'object' && from && typeof to === 'object' && to) return compareSettings(from, to, at)
    return from === to ? [] : [{ kind: 'setting changed', path: at, from: String(from ?? ''), to: String(to ?? '') }]
  })
}

const byId = <T extends { id: string }>(items: readonly T[]): Map<string, T> =>
  new Map(items.map((item) => [item.id, item]))

function compareParts(before: BuildDocument, after: BuildDocument): Difference[] {
  const [old, now] = [byId(before.parts), byId(after.parts)]
  const removed = before.parts
    .filter((part) => !now.has(part.id))
    .map(({ id, ref, model }): Difference => ({ kind: 'part removed', part: id, ref, model }))
  const changed = after.parts.flatMap((part): Difference[] => {
    const { id, ref, model } = part
    const was = old.get(id)
    return was
      ? comparePart(was, part, placeIn(old, was), placeIn(now, part))
      : [{ kind: 'part added', part: id, ref, model }]
  })
  return [...removed, ...changed]
}

function placeIn(parts: ReadonlyMap<string, Part>, { bay }: Part): Place | null {
  return bay ? { case: parts.get(bay.case)?.ref ?? bay.case, slot: bay.slot } : null
}

function comparePart(was: Part, is: Part, from: Place | null, to: Place | null): Difference[] {
  const of = { part: is.id, ref: is.ref }
  const fields = toldFields.flatMap((field): Difference[] => {
    const [old, now] = [was, is].map((part) => part[field]?.trim() || null) as [string | null, string | null]
    return old === now ? [] : [{ kind: 'part changed', ...of, field, from: old, to: now }]
  })
  const paths = [...new Set([...Object.keys(was.overrides ?? {}), ...Object.keys(is.overrides ?? {})])]
  const figures = paths.flatMap((path): Difference[] => {
    const [old, now] = [was.overrides?.[path] ?? null, is.overrides?.[path] ?? null]
    return same(old, now) ? [] : [{ kind: 'figure changed', ...of, path, from: old, to: now }]
  })
  return [
    ...fields,
    ...(same(was.bay, is.bay) ? [] : [{ kind: 'part moved' as const, ...of, from, to }]),
    ...figures,
    ...(same(was.routes_mm, is.routes_mm) ? [] : [{ kind: 'routes changed' as const, ...of }]),
    ...(same(was.pinTest, is.pinTest) ? [] : [{ kind: 'pin test changed' as const, ...of, to: is.pinTest ?? null }]),
  ]
}

function compareModels(before: readonly Model[], after: readonly Model[]): Difference[] {
  const [old, now] = [byId(before), byId(after)]
  return [
    ...before.filter((model) => !now.has(model.id)).map((model) => tell('model removed', model)),
    ...after.flatMap((model) => {
      const was = old.get(model.id)
      if (was === undefined) return [tell('model added', model)]
      return same(was, model) ? [] : [changedModel(was, model)]
    }),
  ]
}

const tell = (kind: 'model added' | 'model removed', { id, name }: Model): Difference => ({ kind, model: id, name })

const changedModel = (was: Model, is: Model): Difference => ({
  kind: 'model changed',
  model: is.id,
  name: is.name,
  figures: compareFigures(was, is),
})

function compareAccepted(before: readonly AcceptedFinding[], after: readonly AcceptedFinding[]): Difference[] {
  const [old, now] = [before, after].map((list) => new Map(list.map((entry) => [entry.key, entry])))
  return [
    ...before
      .filter(({ key }) => !now?.has(key))
      .map(({ key, reason }): Difference => ({ kind: 'acceptance withdrawn', key, reason })),
    ...after
      .filter((entry) => !same(old?.get(entry.key), entry))
      .map(({ key, reason }): Difference => ({ kind: 'finding accepted', key, reason })),
  ]
}

function comparePurchases(before: readonly Purchase[], after: readonly Purchase[]): Difference[] {
  const [old, now] = [before, after].map((list) => new Map(list.map((entry) => [entry.line, entry])))
  return [...new Set([...before, ...after].map(({ line }) => line))].flatMap((line): Difference[] => {
    const [from, to] = [old?.get(line) ?? null, now?.get(line) ?? null]
    return same(from, to) ? [] : [{ kind: 'purchase changed', line, from, to }]
  })
}
