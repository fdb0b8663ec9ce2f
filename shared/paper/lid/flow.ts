import type { PageMark } from '../page.ts'
import type { Section, SectionMaker, Strip } from './strips.ts'
import { baseline, line, wrapAll } from './strips.ts'
import type { Look } from './style.ts'

/** Where the sections of a sheet go: page after page, each with its head. */
export interface Frame {
  x: number
  top: number
  width: number
  bottom: number
}

/** Sections below each other, or two rows of them side by side where both fit on one page. */
export type Placed =
  { kind: 'full'; make: SectionMaker } | { kind: 'pair'; left: SectionMaker; right: SectionMaker; share: number }

const between_mm = 7

/** Puts sections on pages. The first page may begin lower than the others. */
export function flow(look: Look, frames: { first: Frame; next: Frame }, content: readonly Placed[]): PageMark[][] {
  const pages: PageMark[][] = [[]]
  let frame = frames.first
  let y = frame.top
  const turn = () => {
    pages.push([])
    frame = frames.next
    y = frame.top
  }
  const draw = (strip: Strip, x: number) => {
    pages.at(-1)?.push(...strip.draw(x, y))
    y += strip.height
  }

  const place = (section: Section) => {
    const title = titleStrip(look, section.title, frame.width)
    const opening = title.height + (section.head?.height ?? 0)
    const whole = opening + heightOf(section.strips)
    const isFresh = () => y === frame.top
    const gap = () => (isFresh() ? 0 : look.density.gap_mm)
    const needed = section.isWhole ? whole : opening + (section.strips[0]?.height ?? 0)
    const fitsAPage = needed <= frames.next.bottom - frames.next.top
    if (!isFresh() && fitsAPage && y + gap() + needed > frame.bottom) turn()
    y += gap()
    draw(title, frame.x)
    if (section.head) draw(section.head, frame.x)
    section.strips.forEach((strip, i) => {
      if (i > 0 && y + strip.height > frame.bottom) {
        turn()
        draw(titleStrip(look, `${section.title}, continued`, frame.width), frame.x)
        if (section.head) draw(section.head, frame.x)
      }
      draw(strip, frame.x)
    })
  }

  for (const one of content) {
    if (one.kind === 'full') {
      for (const section of one.make(frame.width)) place(section)
      continue
    }
    const leftWidth = (frame.width - between_mm) * one.share
    const left = column(look, one.left(leftWidth), leftWidth)
    const rightWidth = frame.width - between_mm - leftWidth
    const right = column(look, one.right(rightWidth), rightWidth)
    const height = Math.max(left.height, right.height)
    if (height > frames.next.bottom - frames.next.top) {
      for (const section of [...one.left(frame.width), ...one.right(frame.width)]) place(section)
      continue
    }
    const gap = y === frame.top ? 0 : look.density.gap_mm
    if (y + gap + height > frame.bottom) turn()
    else y += gap
    pages.at(-1)?.push(...left.draw(frame.x, y), ...right.draw(frame.x + leftWidth + between_mm, y))
    y += height
  }
  return pages
}

const heightOf = (strips: readonly Strip[]): number => strips.reduce((sum, { height }) => sum + height, 0)

/** The heading of a section, in as many lines as it needs. */
export function titleStrip(look: Look, title: string, width: number): Strip {
  const { title_pt } = look.density
  const pitch = title_pt * 0.43
  const lines = wrapAll(title, width, title_pt, 700)
  if (lines.length === 0) return { height: 0, draw: () => [] }
  return {
    height: lines.length * pitch + title_pt * 0.1,
    draw: (x, y) =>
      lines.flatMap((words, i) =>
        line(x, y + i * pitch + baseline(pitch, title_pt), words, title_pt, {
          weight: 700,
          colour: look.inks.ink,
        }).map((mark) => ({ ...mark, ...(i === 0 && { isHeading: true }) })),
      ),
  }
}

/** Sections below each other as one piece. */
function column(look: Look, sections: readonly Section[], width: number): Strip {
  const strips = sections.flatMap((section, i) => [
    ...(i > 0 ? [space(look.density.gap_mm)] : []),
    titleStrip(look, section.title, width),
    ...(section.head ? [section.head] : []),
    ...section.strips,
  ])
  return {
    height: heightOf(strips),
    draw: (x, y) => {
      let at = y
      return strips.flatMap((strip) => {
        const marks = strip.draw(x, at)
        at += strip.height
        return marks
      })
    },
  }
}

const space = (height: number): Strip => ({ height, draw: () => [] })
