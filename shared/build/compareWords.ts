import type { Quantity } from '../quantity/quantity.ts'
import type { Difference, Place, ToldField } from './compare.ts'
import type { NamedEnd } from './compareJoints.ts'

const fieldNames: Readonly<Record<ToldField, string>> = {
  ref: 'designation',
  model: 'model',
  name: 'name',
  serial: 'serial',
  role: 'role',
  mode: 'mode',
  note: 'note',
}

/** A difference in one sentence, as a reviewer reads it. `modelName` gives the name of a model by its id. */
export function differenceWords(difference: Difference, modelName: (id: string) => string = (id) => id): string {
  switch (difference.kind) {
    case 'part added':
      return `${difference.ref} added: ${modelName(difference.model)}.`
    case 'part removed':
      return `${difference.ref} removed: ${modelName(difference.model)}.`
    case 'part moved':
      return `${difference.ref} moved from ${placeWords(difference.from)} to ${placeWords(difference.to)}.`
    case 'part changed': {
      const { ref, field, from, to } = difference
      const [old, now] = [from, to].map((value) => (value && field === 'model' ? modelName(value) : value))
      return changedWords(`${ref}: ${fieldNames[field]}`, old ?? '', now ?? '')
    }
    case 'figure changed':
      return changedWords(
        `${difference.ref}: own figure ${difference.path}`,
        figureWords(difference.from),
        figureWords(difference.to),
      )
    case 'routes changed':
      return `${difference.ref}: measured routes changed.`
    case 'pin test changed':
      return difference.to
        ? `${difference.ref}: pin test on record, by ${difference.to.by} on ${difference.to.on}.`
        : `${difference.ref}: pin test withdrawn.`
    case 'setting changed':
      return changedWords(`Setting ${difference.path}`, difference.from, difference.to)
    case 'model added':
    case 'model removed':
    case 'model changed':
      return `Own ${difference.kind}: ${difference.name}.`
    case 'finding accepted':
      return `Finding accepted (${difference.key}): ${difference.reason}`
    case 'acceptance withdrawn':
      return `Acceptance withdrawn (${difference.key}).`
    case 'build renamed':
      return changedWords(
        difference.field === 'name' ? 'Name of the build' : 'Name on the machine',
        difference.from,
        difference.to,
      )
    case 'joint added':
      return `${endWords(difference.a)} joined to ${endWords(difference.b)}.`
    case 'joint removed':
      return `${endWords(difference.a)} taken off ${endWords(difference.b)}.`
    case 'rewired':
      return `${endWords(difference.at)} rewired from ${endWords(difference.from)} to ${endWords(difference.to)}.`
  }
}

const endWords = ({ ref, connector }: NamedEnd): string => `${ref} ${connector}`

const placeWords = (place: Place | null): string => (place ? `bay ${place.slot} of ${place.case}` : 'no bay')

function figureWords(quantity: Quantity | null): string {
  if (!quantity) return ''
  return `${quantity.value ?? 'unknown'} (${quantity.origin})`
}

function changedWords(what: string, from: string, to: string): string {
  if (from === '') return `${what} set to ${to}.`
  return to === '' ? `${what} cleared (was ${from}).` : `${what} changed from ${from} to ${to}.`
}
