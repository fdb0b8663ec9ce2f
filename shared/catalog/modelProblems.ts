import { lines } from '../quantity/rails.ts'
import type { ConnectorType } from './connectorType.ts'
import { supplyInside, type Model, type ModelConnector, type ModelKind } from './model.ts'

type Report = (path: readonly PropertyKey[], message: string) => void
type Types = ReadonlyMap<string, ConnectorType>

/** What one model gets wrong against its connector types and the customs of its kind. */
export function modelProblems(model: Model, types: Types, classes: ReadonlySet<string>, report: Report): void {
  if (model.class !== undefined && !classes.has(model.class)) report(['class'], `no class "${model.class}"`)
  model.connectors.forEach((connector, i) => checkConnector(model, connector, i, types, report))
  checkWiring(model, types, report)
  checkLanes(model, types, report)
  checkFeeds(model, types, report)
  checkConverters(model, types, report)
  checkBays(model, report)
  checkKind(model, report)
}

const contactsOf = (connector: ModelConnector, type: ConnectorType | undefined, line: (typeof lines)[number]) =>
  connector.contacts?.[line] ?? type?.power?.contacts[line] ?? 0

function checkConnector(model: Model, connector: ModelConnector, i: number, types: Types, report: Report): void {
  const type = types.get(connector.type)
  if (!type) return report(['connectors', i, 'type'], `no connector type "${connector.type}"`)
  if (connector.contacts && !type.power)
    report(['connectors', i, 'contacts'], `"${connector.type}" carries no power contacts`)
  for (const line of lines)
    if ((connector.contacts?.[line] ?? 0) > (type.power?.contacts[line] ?? 0) && !type.standard.startsWith('none'))
      report(['connectors', i, 'contacts', line], `more contacts than "${connector.type}" has`)
  if (connector.contact3 !== undefined && !type.power?.hasPowerDisableContact)
    report(['connectors', i, 'contact3'], `"${connector.type}" has no contact 3 of that kind`)
  if (connector.slot && connector.slot.lanes > (type.data?.lanes ?? 0))
    report(['connectors', i, 'slot', 'lanes'], `more lanes than "${connector.type}" has`)
  if (connector.bay !== undefined && model.kind !== 'backplane')
    report(['connectors', i, 'bay'], 'only backplanes have bay receptacles')
}

function checkWiring(model: Model, types: Types, report: Report): void {
  const byId = new Map(model.connectors.map((connector) => [connector.id, connector]))
  model.wiring.forEach((conductor, i) => {
    for (const end of ['from', 'to'] as const) {
      const connector = byId.get(conductor[end])
      if (connector && contactsOf(connector, types.get(connector.type), conductor.line) === 0)
        report(['wiring', i, end], `connector "${connector.id}" has no ${conductor.line} contact`)
    }
  })
}

function checkLanes(model: Model, types: Types, report: Report): void {
  const byId = new Map(model.connectors.map((connector) => [connector.id, connector]))
  const lanesOf = (id: string) => types.get(byId.get(id)?.type ?? '')?.data?.lanes ?? 0
  model.lanes.forEach((route, i) => {
    if (route.fromLane + route.count > lanesOf(route.from))
      report(['lanes', i, 'from'], `"${route.from}" has ${lanesOf(route.from)} lanes`)
    if (route.toLane + route.count > lanesOf(route.to))
      report(['lanes', i, 'to'], `"${route.to}" has ${lanesOf(route.to)} lanes`)
  })
  const ports = [...model.controllers.flatMap((controller) => controller.ports), ...(model.expander?.ports ?? [])]
  for (const port of ports) if (lanesOf(port) === 0) report(['connectors', port], 'a port needs data lanes')
  model.controllers.forEach((controller, i) => {
    const { uplink } = controller
    if (uplink?.connector === undefined) return
    if (!byId.has(uplink.connector))
      report(['controllers', i, 'uplink', 'connector'], `no connector "${uplink.connector}"`)
    else if (uplink.lanes > lanesOf(uplink.connector))
      report(['controllers', i, 'uplink', 'lanes'], `"${uplink.connector}" has ${lanesOf(uplink.connector)} lanes`)
  })
}

/** Each rail of a supply feeds something; an outlet is fed with the voltage that its contacts are meant for. */
function checkFeeds(model: Model, types: Types, report: Report): void {
  if (!model.supply) {
    const feeding = model.connectors.findIndex((connector) => connector.feeds)
    if (feeding >= 0) report(['connectors', feeding, 'feeds'], 'only a supply feeds')
    return
  }
  const railById = new Map(model.supply.rails.map((rail) => [rail.id, rail]))
  const reached = new Set(model.wiring.flatMap(({ from, to }) => (from === supplyInside ? [] : [to])))
  model.wiring.forEach(({ from, to, line }, i) => {
    const feeds = model.connectors.find(({ id }) => id === to)?.feeds
    if (from === supplyInside && (line === 'return' ? !feeds : feeds?.[line] === undefined))
      report(['wiring', i, 'to'], `a wire from the inside leads to a connector that is fed, "${to}" is not on ${line}`)
  })
  const fed = new Set<string>()
  model.connectors.forEach((connector, i) => {
    for (const [rail, id] of Object.entries(connector.feeds ?? {})) {
      fed.add(id)
      if (railById.get(id)?.rail !== rail) report(['connectors', i, 'feeds', rail], `rail "${id}" is not ${rail}`)
      if (contactsOf(connector, types.get(connector.type), rail as (typeof lines)[number]) === 0)
        report(['connectors', i, 'feeds', rail], `"${connector.id}" has no ${rail} contact`)
    }
    if (!connector.feeds && !reached.has(connector.id))
      report(['connectors', i, 'feeds'], 'an outlet of a supply is fed or hangs on one that is')
  })
  model.supply.rails.forEach((rail, i) => {
    if (!fed.has(rail.id)) report(['supply', 'rails', i], `rail "${rail.id}" feeds no connector`)
  })
  model.supply.groups.forEach((group, i) => {
    for (const id of group.rails)
      if (!railById.has(id)) report(['supply', 'groups', i, 'rails'], `no supply rail "${id}"`)
    if (!group.limit_A && !group.limit_W) report(['supply', 'groups', i], 'a group needs a limit')
  })
  checkRising(model, report)
}

/** A converter takes from a connector that has its input, and feeds connectors that have its output. */
function checkConverters(model: Model, types: Types, report: Report): void {
  const has = (id: string, rail: '12V' | '5V' | '3.3V') => {
    const connector = model.connectors.find((candidate) => candidate.id === id)
    return connector !== undefined && contactsOf(connector, types.get(connector.type), rail) > 0
  }
  model.converters.forEach(({ from, rail, feeds, efficiency }, i) => {
    const path = ['converters', i]
    if (!has(from.connector, from.rail)) report([...path, 'from'], `"${from.connector}" has no ${from.rail} contact`)
    feeds.forEach((id, j) => {
      if (!has(id, rail)) report([...path, 'feeds', j], `"${id}" has no ${rail} contact`)
    })
    if ((efficiency.value ?? 0) > 1) report([...path, 'efficiency'], 'efficiency is a share, at most 1')
  })
}

function checkRising(model: Model, report: Report): void {
  const points = model.supply?.efficiency ?? []
  points.forEach((point, i) => {
    const before = points[i - 1]
    if (before && before.share >= point.share) report(['supply', 'efficiency', i, 'share'], 'shares rise')
    if ((point.efficiency.value ?? 0) > 1) report(['supply', 'efficiency', i], 'efficiency is a share, at most 1')
  })
}

function checkBays(model: Model, report: Report): void {
  const places = new Set<string>()
  model.bays.forEach((bay, i) => {
    const place = `${bay.row},${bay.column}`
    if (places.has(place)) report(['bays', i], `another bay is at row ${bay.row}, column ${bay.column}`)
    places.add(place)
  })
  const numbers = model.connectors.flatMap((connector) => (connector.bay === undefined ? [] : [connector.bay]))
  if (new Set(numbers).size < numbers.length) report(['connectors'], 'two receptacles serve one bay')
}

const only: Partial<Record<ModelKind, string>> = { drive: 'plug', fan: 'power', load: 'power' }
const first: Partial<Record<ModelKind, readonly string[]>> = {
  lead: ['supply', 'out-1'],
  splitter: ['in', 'out-1', 'out-2'],
  backplane: ['power-1', 'data-1', 'bay-1'],
  board: ['main'],
  controller: ['port-a', 'edge'],
  expander: ['port-1'],
  cable: ['a'],
}

/** Names of connectors that leads, splitters, drives and so on share, so that tools can rely on them. */
function checkKind(model: Model, report: Report): void {
  const ids = model.connectors.map((connector) => connector.id)
  const single = only[model.kind]
  if (single !== undefined && (ids.length !== 1 || ids[0] !== single))
    report(['connectors'], `a ${model.kind} has one connector, "${single}"`)
  for (const id of first[model.kind] ?? [])
    if (!ids.includes(id)) report(['connectors'], `a ${model.kind} has a connector "${id}"`)
  if (model.kind === 'case' && ids.length > 0) report(['connectors'], 'a case has no connectors')
  if (model.kind === 'breakout' && !ids.includes('host') && !ids.includes('device'))
    report(['connectors'], 'a breakout has a multilane end, "host" or "device"')
  if ((model.kind === 'breakout' || model.kind === 'cable') && !model.cable)
    report(['cable'], `a ${model.kind} needs its direction and length`)
  if (model.kind === 'controller' && model.controllers.length === 0)
    report(['controllers'], 'a controller needs its ports described')
  if (model.kind === 'expander' && !model.expander) report(['expander'], 'an expander needs its ports described')
  for (const rail of Object.keys(model.loadAt ?? {}))
    if (!model.load?.[rail as '12V']) report(['loadAt', rail], `no ${rail} load`)
}
