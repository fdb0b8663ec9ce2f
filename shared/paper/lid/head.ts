import type { PageMark } from '../page.ts'
import type { LidContent } from './content.ts'
import { baseline, line, rule, widthOf, wrapAll } from './strips.ts'
import { smallest_pt, type Inks } from './style.ts'

export type Code = readonly (readonly boolean[])[]

interface Place {
  x: number
  y: number
  width: number
}

/** Size of the code: a phone reads it from a hand's breadth away, and from an arm's length where there is room. */
const codeSize = (width: number): number => (width > 160 ? 27 : 23)

/** Largest size at which a name fits on one line, between what is fine and what is still a heading. */
function nameSize(name: string, width: number, from: number, to: number): number {
  for (let size = from; size > to; size -= 0.5) if (widthOf(name, size, 700) <= width) return size
  return to
}

/** The head of the first page: which machine, which revision, how it stands, and the code. */
export function firstHead(inks: Inks, content: LidContent, code: Code | null, { x, y, width }: Place) {
  const side = codeSize(width)
  const codeRoom = code ? side + 5 : 0
  const right = x + width - codeRoom
  const facts = [
    { words: content.date, weight: 400 as const },
    { words: content.checked, weight: 600 as const },
    ...(content.checkedBy === '' ? [] : [{ words: `by ${content.checkedBy}`, weight: 400 as const }]),
  ]
  const revision = `Revision ${content.revision}`
  const factRoom = Math.max(34, Math.min(width * 0.3, widthOf(revision, 13, 700) + 4))
  const nameRoom = right - factRoom - 3 - x
  const size = nameSize(content.name, nameRoom, 22, 13)
  const names = wrapAll(content.name, nameRoom, size, 700).slice(0, 2)
  const namePitch = size * 0.43
  const identity = content.machine === '' ? 'no identity given' : `Machine ${content.machine}`
  const marks: PageMark[] = []
  names.forEach((words, i) =>
    marks.push(
      ...line(x, y + i * namePitch + baseline(namePitch, size), words, size, {
        weight: 700,
        colour: inks.ink,
        width: nameRoom,
      }),
    ),
  )
  let at = y + names.length * namePitch + 0.6
  const put = (words: string, pt: number, weight: 400 | 600 | 700, colour: string) => {
    const pitch = pt * 0.43
    for (const one of wrapAll(words, nameRoom, pt, weight).slice(0, 3)) {
      marks.push(...line(x, at + baseline(pitch, pt), one, pt, { weight, colour }))
      at += pitch
    }
  }
  put(identity, 11, 700, inks.ink)
  put(content.summary, 7.5, 400, inks.soft)
  at += 0.8
  put(`Within the stated limits: ${content.within}`, 8.5, 700, content.isWithin ? inks.accent : inks.danger)
  if (content.weakestHop !== '') put(content.weakestHop, 7.5, 400, inks.ink)

  marks.push(
    ...line(right, y + baseline(6, 13), revision, 13, {
      weight: 700,
      anchor: 'end',
      width: factRoom,
      colour: inks.ink,
    }),
  )
  let below = y + 6.2
  for (const { words, weight } of facts)
    for (const one of wrapAll(words, factRoom, 8, weight).slice(0, 3)) {
      marks.push(...line(right, below + baseline(3.5, 8), one, 8, { weight, anchor: 'end', colour: inks.ink }))
      below += 3.5
    }
  if (code) marks.push({ kind: 'code', x: x + width - side, y, size: side, modules: code })
  const bottom = Math.max(at, below, code ? y + side + 1.2 : 0) + 2
  marks.push(rule(x, bottom, width, 0.5, inks.ink))
  return { marks, bottom: bottom + 2.5 }
}

/** Height of the head of further pages. */
export const nextHead_mm = 9

/** The head of further pages: a sheet that comes apart still says where it belongs. */
export function nextHead(inks: Inks, content: LidContent, { x, y, width }: Place): PageMark[] {
  const facts = [content.machine, `revision ${content.revision}`, content.date].filter(Boolean).join(' · ')
  const room = Math.min(width * 0.5, widthOf(facts, 8.5, 600))
  return [
    ...line(x, y + 4.4, content.name, 11, { weight: 700, colour: inks.ink, width: width - room - 5 }),
    ...line(x + width, y + 4.4, facts, 8.5, { weight: 600, anchor: 'end', colour: inks.ink, width: room }),
    rule(x, y + 6.2, width, 0.4, inks.ink),
  ]
}

export const foot_mm = 6

/** The foot of every page: the address in words, and which page of how many. */
export function foot(inks: Inks, content: LidContent, page: string, { x, y, width }: Place): PageMark[] {
  const size = smallest_pt
  const room = widthOf(page, size, 600)
  const plan = content.address === '' ? '' : `Live plan: ${content.address}`
  return [
    rule(x, y + 1.6, width, 0.2, inks.hairline),
    ...line(x, y + 5, plan, size, { colour: inks.ink, width: width - room - 4 }),
    ...line(x + width, y + 5, page, size, { weight: 600, anchor: 'end', colour: inks.ink }),
  ]
}
