import type { Figure, MomentId, Subject } from '../../check/result.ts'
import { counted, listed } from '../../check/words.ts'
import { atMoment } from '../../electrical/names.ts'
import { unprovenHops, type UnprovenHop } from '../../electrical/unproven.ts'
import { defineRule } from '../rule.ts'

interface Facts {
  figure: Figure
  hops: UnprovenHop[]
  couldFail: UnprovenHop[]
  couldPass: UnprovenHop[]
  moment: MomentId
}

export const unproven = defineRule<Facts>({
  meta: {
    id: 'unproven',
    title: 'A verdict that a better figure could turn',
    severities: ['note'],
    finds:
      'Verdicts that would turn from within to beyond the limit, or back, within the stated range of the figure they rest on most, and hops whose limit nobody knows.',
    why: 'A plan on class figures is as good as they are: where a verdict hangs on one, a single measurement settles it.',
    needs: ['low and high of every figure', 'all verdicts on contacts, wires, rails, groups and voltages'],
    sources: [],
    commonPractice: true,
  },
  check(context) {
    const byFigure = new Map<string, Facts>()
    for (const hop of unprovenHops(context)) {
      const key = `${hop.figure.what}|${hop.figure.value}|${hop.figure.unit}`
      const known = byFigure.get(key)
      if (known) known.hops.push(hop)
      else byFigure.set(key, { figure: hop.figure, hops: [hop], couldFail: [], couldPass: [], moment: hop.moment })
    }
    return [...byFigure.values()].map((facts) => {
      facts.hops.sort((a, b) => b.share - a.share)
      facts.couldFail = facts.hops.filter(({ turns }) => turns !== 'to-within')
      facts.couldPass = facts.hops.filter(({ turns }) => turns === 'to-within')
      facts.moment = facts.hops[0]!.moment
      return {
        severity: 'note' as const,
        subjects: subjectsOf(facts.hops),
        detail: facts.figure.what,
        moment: facts.moment,
        decidedBy: [facts.figure],
        about: true,
        facts,
      }
    })
  },
  words({ facts: { figure, couldFail, couldPass, moment } }) {
    const range = rangeWords(figure)
    const names = (hops: readonly UnprovenHop[]) => listed([...new Set(hops.map(({ name }) => name))], 4)
    if (figure.value === null && figure.low === undefined && figure.high === undefined)
      return {
        message: `No ${figure.what} is known: whether ${names(couldFail)} may carry what ${couldFail.length === 1 ? 'it carries' : 'they carry'} cannot be told.`,
        remedy: `Take the figure from the maker's sheet and state it on the part.`,
      }
    const fail =
      couldFail.length > 0
        ? ` At its far end ${counted(couldFail.length, 'verdict')} would turn bad: ${names(couldFail)}.`
        : ''
    const pass =
      couldPass.length > 0
        ? ` At its near end ${counted(couldPass.length, 'verdict')} would turn good: ${names(couldPass)}.`
        : ''
    return {
      message: `The ${figure.what} ${range} decides ${atMoment(moment)}.${fail}${pass}`,
      remedy: measurementFor(figure),
    }
  },
})

function subjectsOf(hops: readonly UnprovenHop[]): Subject[] {
  const seen = new Map<string, Subject>()
  for (const { subject } of hops) seen.set(JSON.stringify(subject), subject)
  return [...seen.values()].slice(0, 200)
}

function rangeWords({ value, low, high, unit, origin }: Figure): string {
  const stated = value === null ? 'unknown' : `${value} ${unit}`
  const range = low !== undefined || high !== undefined ? `, ${low ?? value} to ${high ?? value} ${unit}` : ''
  return `(${stated}${range}; ${origin})`
}

/** The test that would settle a figure. */
function measurementFor({ what, unit }: Figure): string {
  if (what.startsWith('start'))
    return 'Measure one such drive: a clamp meter with peak hold around the wires of that rail, from power-on until it is ready. State the reading on the part.'
  if (what.includes('current on'))
    return 'Measure one such device with a clamp meter around the wires of that rail while it does this. State the reading on the part.'
  if (what.startsWith('rating') || what.startsWith('ampacity'))
    return "Read the rating off the maker's sheet of this connector or wire, and state it on the part."
  if (unit === 'W' || what.startsWith('limit'))
    return 'Read the limit off the label of the supply, and state it on the part.'
  if (what.startsWith('length of')) return 'Measure the lead and state its length on the part.'
  return "Take the figure from the maker's sheet, and state it on the part."
}
