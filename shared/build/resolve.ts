import type { CatalogIndex } from '../catalog/catalog.ts'
import type { ConnectorType } from '../catalog/connectorType.ts'
import type { Model, ModelConnector } from '../catalog/model.ts'
import type { Line } from '../quantity/rails.ts'
import { lines } from '../quantity/rails.ts'
import type { BuildDocument, Joint, Part, Settings } from './document.ts'
import { applyOverrides } from './overrides.ts'
import { formatPath, type DocumentProblem } from './problems.ts'
import { mate, type Mating } from './mating.ts'

/** A part with its model, its own figures already written over the model's. */
export interface ResolvedPart {
  index: number
  part: Part
  model: Model
  connectors: readonly ResolvedConnector[]
  connectorById: ReadonlyMap<string, ResolvedConnector>
}

/** A connector of a placed part. `index` is dense over the whole build, for arrays of numbers. */
export interface ResolvedConnector {
  index: number
  part: ResolvedPart
  connector: ModelConnector
  type: ConnectorType
  /** Contacts that carry each line in this very part. */
  contacts: Readonly<Record<Line, number>>
  joints: ResolvedJoint[]
}

/** A joint with both ends found, and what it carries. Joints that do not mate carry nothing. */
export interface ResolvedJoint {
  index: number
  joint: Joint
  a: ResolvedConnector
  b: ResolvedConnector
  mating: Mating
}

/** The document with every reference followed: what rules, network, lanes and drawings read. */
export interface ResolvedBuild {
  document: BuildDocument
  settings: Settings
  catalog: CatalogIndex
  parts: readonly ResolvedPart[]
  partById: ReadonlyMap<string, ResolvedPart>
  connectors: readonly ResolvedConnector[]
  joints: readonly ResolvedJoint[]
  jointById: ReadonlyMap<string, ResolvedJoint>
  /** References that lead nowhere; what they belong to is left out of the rest. */
  problems: readonly DocumentProblem[]
}

/**
 * Follows every reference of a document. Never throws on a document that the schema accepts: what cannot be
 * followed is listed in `problems` and left out.
 */
export function resolve(document: BuildDocument, catalog: CatalogIndex): ResolvedBuild {
  const problems: DocumentProblem[] = []
  const ownModels = new Map(document.models.map((model) => [model.id, model]))
  const parts: ResolvedPart[] = []
  const partById = new Map<string, ResolvedPart>()
  const connectors: ResolvedConnector[] = []

  document.parts.forEach((part, i) => {
    const known = ownModels.get(part.model) ?? catalog.models.get(part.model)
    if (!known) {
      problems.push({ path: `parts[${i}].model`, message: `no model "${part.model}" in this document or the catalog` })
      return
    }
    const model = applyOverrides(known, part.overrides, (path, message) =>
      problems.push({ path: formatPath(['parts', i, 'overrides', path]), message }),
    )
    const resolved = resolvePart(part, model, parts.length, connectors, catalog, (message) =>
      problems.push({ path: `parts[${i}].model`, message }),
    )
    parts.push(resolved)
    partById.set(part.id, resolved)
  })

  document.parts.forEach((part, i) => checkPartReferences(part, i, partById, problems))

  const joints: ResolvedJoint[] = []
  const jointById = new Map<string, ResolvedJoint>()
  document.joints.forEach((joint, i) => {
    const a = findEnd(joint, 'a', i, partById, problems)
    const b = findEnd(joint, 'b', i, partById, problems)
    if (!a || !b) return
    if (a === b) {
      problems.push({ path: `joints[${i}].b`, message: 'a connector cannot be joined to itself' })
      return
    }
    const resolved: ResolvedJoint = { index: joints.length, joint, a, b, mating: mate(a.type, b.type) }
    joints.push(resolved)
    jointById.set(joint.id, resolved)
    a.joints.push(resolved)
    b.joints.push(resolved)
  })

  return { document, settings: document.settings, catalog, parts, partById, connectors, joints, jointById, problems }
}

function resolvePart(
  part: Part,
  model: Model,
  index: number,
  all: ResolvedConnector[],
  catalog: CatalogIndex,
  report: (message: string) => void,
): ResolvedPart {
  const own: ResolvedConnector[] = []
  const connectorById = new Map<string, ResolvedConnector>()
  const resolved: ResolvedPart = { index, part, model, connectors: own, connectorById }
  for (const connector of model.connectors) {
    const type = catalog.connectorTypes.get(connector.type)
    if (!type) {
      report(`model "${model.id}" uses connector type "${connector.type}", which the catalog does not have`)
      continue
    }
    const made: ResolvedConnector = {
      index: all.length,
      part: resolved,
      connector,
      type,
      contacts: contactsOf(connector, type),
      joints: [],
    }
    all.push(made)
    own.push(made)
    connectorById.set(connector.id, made)
  }
  return resolved
}

function contactsOf(connector: ModelConnector, type: ConnectorType): Record<Line, number> {
  const counts: Record<Line, number> = { '12V': 0, '5V': 0, '3.3V': 0, return: 0 }
  for (const line of lines) counts[line] = connector.contacts?.[line] ?? type.power?.contacts[line] ?? 0
  return counts
}

function checkPartReferences(
  part: Part,
  i: number,
  partById: ReadonlyMap<string, ResolvedPart>,
  problems: DocumentProblem[],
): void {
  if (part.bay) {
    const holder = partById.get(part.bay.case)
    if (!holder) problems.push({ path: `parts[${i}].bay.case`, message: `no part "${part.bay.case}" in this document` })
    else if (!holder.model.bays.some((bay) => bay.slot === part.bay?.slot))
      problems.push({ path: `parts[${i}].bay.slot`, message: `${holder.part.ref} has no bay ${part.bay.slot}` })
  }
  for (const id of Object.keys(part.routes_mm ?? {}))
    if (partById.get(part.id)?.connectorById.has(id) === false)
      problems.push({
        path: formatPath(['parts', i, 'routes_mm', id]),
        message: `${part.ref} has no connector "${id}"`,
      })
}

function findEnd(
  joint: Joint,
  end: 'a' | 'b',
  i: number,
  partById: ReadonlyMap<string, ResolvedPart>,
  problems: DocumentProblem[],
): ResolvedConnector | undefined {
  const { part: partId, connector: connectorId } = joint[end]
  const part = partById.get(partId)
  if (!part) {
    problems.push({ path: `joints[${i}].${end}.part`, message: `no part "${partId}" in this document` })
    return undefined
  }
  const connector = part.connectorById.get(connectorId)
  if (!connector)
    problems.push({
      path: `joints[${i}].${end}.connector`,
      message: `${part.part.ref} (${part.model.id}) has no connector "${connectorId}"; it has ${part.connectors.map((c) => c.connector.id).join(', ') || 'none'}`,
    })
  return connector
}
