import type { Model, ModelConnector } from '#shared/catalog/model.ts'
import { lineNames } from '#shared/quantity/display.ts'
import { lines, type Line } from '#shared/quantity/rails.ts'

/** What sets this connector of this part apart from others of its type, in words. */
export function connectorNotes(connector: ModelConnector, model: Model): string[] {
  const wired = lines
    .filter((line) => connector.contacts?.[line] !== undefined)
    .map((line) => `${connector.contacts![line]} × ${lineNames[line]}`)
  const fed = Object.entries(connector.feeds ?? {}).map(([rail, id]) =>
    rail === id ? lineNames[rail as Line] : `${lineNames[rail as Line]} from ${id}`,
  )
  return [
    wired.length > 0 ? `contacts wired: ${wired.join(', ')}` : undefined,
    fed.length > 0 ? `fed with ${fed.join(', ')}` : undefined,
    connector.contact3 === 'open' ? 'contact 3 left open' : undefined,
    connector.contact3 === 'fed' ? 'contact 3 carries 3.3 V when it arrives' : undefined,
    connector.contact11 === 'grounded' ? 'contact 11 grounded: the drive starts at once' : undefined,
    connector.contact11 === 'floating' ? 'contact 11 open: the drive may wait' : undefined,
    connector.bay === undefined ? undefined : `serves bay ${connector.bay}`,
    connector.slot && `${connector.slot.lanes} lanes wired, PCI Express ${connector.slot.generation}`,
    ...Object.entries(model.loadAt ?? {})
      .filter(([, id]) => id === connector.id)
      .map(([rail]) => `${lineNames[rail as Line]} load is drawn here`),
  ].filter((note): note is string => note !== undefined)
}
