import type { PageMark } from '../page.ts'
import type { LidContent } from './content.ts'
import type { Code } from './head.ts'
import { baseline, line, wrapAll, type Section, type Strip } from './strips.ts'
import { smallest_pt, type Inks, type Look } from './style.ts'

const height_mm = 24

/** A lid is taken off and swapped: this label goes on what stays, so that both can be held against each other. */
export function twinSection(look: Look, content: LidContent, code: Code | null, width: number): Section {
  const label: Strip = {
    height: height_mm + 1,
    draw: (x, y) => drawTwin(look.inks, content, code, x, y + 0.5, Math.min(width, 96)),
  }
  return { title: 'Twin label for the body of the case (cut out)', strips: [label], isWhole: true }
}

function drawTwin(inks: Inks, content: LidContent, code: Code | null, x: number, y: number, width: number): PageMark[] {
  const side = height_mm - 5
  const room = width - 6 - (code ? side + 3 : 0)
  const note = 'Belongs to the lid with the same identity and revision.'
  return [
    { kind: 'box', x, y, width, height: height_mm, stroke: inks.ink, stroke_mm: 0.25, dash: '1.6 1' },
    ...line(x + 3, y + 6.6, content.machine || content.name, 15, { weight: 700, colour: inks.ink, width: room }),
    ...line(x + 3, y + 11.2, content.machine === '' ? '' : content.name, 8.5, {
      weight: 600,
      colour: inks.ink,
      width: room,
    }),
    ...line(x + 3, y + 15.2, `Revision ${content.revision} · ${content.date}`, 8.5, { colour: inks.ink, width: room }),
    ...wrapAll(note, room, smallest_pt)
      .slice(0, 2)
      .flatMap((words, i) =>
        line(x + 3, y + 16 + i * 2.9 + baseline(2.9, smallest_pt), words, smallest_pt, {
          colour: inks.soft,
          width: room,
        }),
      ),
    ...(code ? [{ kind: 'code' as const, x: x + width - side - 3, y: y + 2.5, size: side, modules: code }] : []),
  ]
}
