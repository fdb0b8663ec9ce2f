import type { Quantity } from '../quantity/quantity.ts'
import type { Difference, Place, ToldField } from './compare.ts'
import type { NamedEnd } from './compareJoints.ts'
import type { Purchase } from './document.ts'

const fieldNames: Readonly<Record<ToldField, string>> = {
  ref: 'designation',
  model: 'model',
  name: 'name',
  serial: 'serial',
  wwn: 'WWN',
  makerModel: 'maker’s model',
  role: 'role',
  mode: 'mode',
  note: 'note',
}

const settingNames: Readonly<Record<string, string>> = {
  tolerance: 'Voltage tolerance',
  wireTemperature_C: 'Wire temperature (°C)',
  derating: 'Caution above this share of a limit',
  shortTimeAllowance: 'Short-time allowance',
  bundleFactor: 'Share that wires in a bundle carry',
  'spinUp.mode': 'Start of the motors',
  'spinUp.by': 'What holds the start back',
  'spinUp.groupSize': 'Drives in a start group',
  'spinUp.interval_s': 'Seconds between start groups',
  'array.needsPassThrough': 'Array needs drives passed through',
  'array.parityDrives': 'Drives that may be lost',
  mains_V: 'Mains (V)',
}

/** Which of the two states an end is read in. */
export type State = 'before' | 'after'

/** Names that stand in catalog and findings, not in the documents. Each falls back to the id. */
export interface CompareNames {
  model?: (id: string) => string
  /** A connector as it is printed on the part, as "outlet 3"; null for the only one of its part. */
  connector?: (end: NamedEnd, state: State) => string | null
  /** True for parts of which one says that they moved. */
  travels?: (part: string) => boolean
  /** What a finding is about, by its key. */
  finding?: (key: string) => string
}

/** A difference in one sentence, as a reviewer reads it. */
export function differenceWords(difference: Difference, names: CompareNames = {}): string {
  const modelName = names.model ?? ((id: string) => id)
  const findingName = names.finding ?? ((key: string) => key)
  const endWords = (end: NamedEnd, state: State): string => {
    const label = names.connector ? names.connector(end, state) : end.connector
    return label === null ? end.ref : `${end.ref} ${label}`
  }
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
      return changedWords(
        settingNames[difference.path] ?? `Setting ${difference.path}`,
        settingWords(difference.from),
        settingWords(difference.to),
      )
    case 'model added':
    case 'model removed':
      return `Own ${difference.kind}: ${difference.name}.`
    case 'model changed': {
      const figures = difference.figures.map(({ path, from, to }) =>
        changedWords(path, figureWords(from), figureWords(to)).replace(/\.$/, ''),
      )
      return `Own model changed: ${difference.name}${figures.length === 0 ? '' : ` (${figures.join('; ')})`}.`
    }
    case 'finding accepted':
      return `Finding accepted (${findingName(difference.key)}): ${difference.reason}`
    case 'acceptance withdrawn':
      return `Acceptance withdrawn (${findingName(difference.key)}).`
    case 'purchase changed':
      return changedWords(
        `Parts list, ${lineWords(difference.line, modelName)}`,
        purchaseWords(difference.from),
        purchaseWords(difference.to),
      )
    case 'build renamed':
      return changedWords(
        difference.field === 'name' ? 'Name of the build' : 'Name on the machine',
        difference.from,
        difference.to,
      )
    case 'joint added':
      return `${endWords(difference.a, 'after')} joined to ${endWords(difference.b, 'after')}.`
    case 'joint removed':
      return `${endWords(difference.a, 'before')} taken off ${endWords(difference.b, 'before')}.`
    case 'rewired': {
      const { at, from, to } = difference
      const verb = names.travels?.(at.part) ? 'moved' : 'rewired'
      return `${endWords(at, 'after')} ${verb} from ${endWords(from, 'before')} to ${endWords(to, 'after')}.`
    }
  }
}

const placeWords = (place: Place | null): string => (place ? `bay ${place.slot} of ${place.case}` : 'no bay')

const settingWords = (value: string): string => (value === 'true' ? 'yes' : value === 'false' ? 'no' : value)

function figureWords(quantity: Quantity | null): string {
  if (!quantity) return ''
  return `${quantity.value ?? 'unknown'} (${quantity.origin})`
}

function lineWords(line: string, modelName: (id: string) => string): string {
  const [model = line, length] = line.split('@')
  return length === undefined ? modelName(model) : `${modelName(model)}, ${length} mm`
}

function purchaseWords(purchase: Purchase | null): string {
  if (!purchase) return ''
  const { owned, ordered, price, currency = '', note } = purchase
  return [
    ...(owned === undefined ? [] : [`${owned} owned`]),
    ...(ordered === undefined ? [] : [`${ordered} ordered`]),
    ...(price === undefined ? [] : [`${price} ${currency}`.trim()]),
    ...(note === undefined ? [] : [`"${note}"`]),
  ].join(', ')
}

function changedWords(what: string, from: string, to: string): string {
  const words =
    from === ''
      ? `${what} set to ${to}`
      : to === ''
        ? `${what} cleared (was ${from})`
        : `${what} changed from ${from} to ${to}`
  return words.endsWith('.') ? words : `${words}.`
}
