import type { OriginKind, Quantity } from '#shared/quantity/quantity.ts'

/** Short name of an origin, for tables. */
export const originNames: Readonly<Record<OriginKind, string>> = {
  standard: 'standard',
  maker: 'maker',
  measured: 'measured',
  'common practice': 'common practice',
  'class default': 'class default',
  guess: 'guess',
}

const openings: Readonly<Record<OriginKind, string>> = {
  standard: 'From the standard',
  maker: 'Stated by the maker',
  measured: 'Measured',
  'common practice': 'Common practice of the trade',
  'class default': 'Default of its class',
  guess: 'A guess',
}

/** Where a figure comes from, in one sentence. `sourceTitle` is the title of `quantity.source`. */
export function originSentence(quantity: Quantity, sourceTitle?: string): string {
  const place = [sourceTitle ?? quantity.source, quantity.clause].filter(Boolean).join(', ')
  const who = [quantity.by && `by ${quantity.by}`, quantity.on && `on ${quantity.on}`].filter(Boolean).join(' ')
  const opening =
    quantity.origin === 'maker' && quantity.by ? 'Read off the label or datasheet' : openings[quantity.origin]
  const words = [opening, who].filter(Boolean).join(' ')
  const doubt = quantity.fromMemory ? ' From memory, not yet checked.' : ''
  return `${words}${place ? `: ${place}` : ''}.${doubt}`
}
