import type { Severity } from '../../check/severity.ts'
import { beforePulling, cautions, type LidContent, type LidFinding } from './content.ts'
import { paragraph, widthOf, type Section } from './strips.ts'
import type { Look } from './style.ts'
import { tableHead, tableRow, wish, type Column } from './table.ts'

const numbered = (look: Look, width: number, lines: readonly string[]) =>
  lines.map((words, i) => paragraph(look, width, words, { words: String(i + 1), width: 4.5, weight: 700 }))

export const beforeSection = (look: Look, width: number): Section => ({
  title: 'Before you pull a drive',
  strips: numbered(look, width, beforePulling),
  isWhole: true,
})

export const cautionSection = (look: Look, width: number): Section => ({
  title: 'Cautions',
  strips: cautions.map((words, i) => paragraph(look, width, words, undefined, { weight: i < 2 ? 700 : 400 })),
  isWhole: true,
})

export const startSection = (look: Look, { startGroups }: LidContent, width: number): Section => ({
  title: 'Start groups',
  strips: startGroups.map((words) => paragraph(look, width, words)),
})

/** Whom to ask; nothing where nobody is named. */
export const contactSection = (look: Look, { contact }: LidContent, width: number): Section[] =>
  contact === '' ? [] : [{ title: 'Contact', strips: [paragraph(look, width, contact)], isWhole: true }]

/** Where the code leads, in words, for whoever has no camera at hand. */
export const addressSection = (look: Look, { address }: LidContent, width: number): Section[] =>
  address === ''
    ? []
    : [{ title: 'The live plan', strips: [paragraph(look, width, `The code opens ${address}`)], isWhole: true }]

const leadWidth = (look: Look): number => widthOf('caution', look.density.body_pt, 700) + 2.5

const findingStrip = (look: Look, width: number, { severity, message, accepted }: LidFinding) =>
  paragraph(
    look,
    width,
    accepted === '' ? message : `${message} ${accepted}`,
    { words: severity, width: leadWidth(look), weight: 700 },
    { colour: inkOf(look, severity) },
  )

const inkOf = ({ inks }: Look, severity: Severity): string =>
  severity === 'note' ? inks.ink : severity === 'caution' ? inks.caution : inks.danger

export function findingSections(look: Look, { open, accepted }: LidContent, width: number): Section[] {
  const none = [paragraph(look, width, 'None: every hop is within the stated limits.')]
  return [
    {
      title: `Open findings (${open.length})`,
      strips: open.length === 0 ? none : open.map((finding) => findingStrip(look, width, finding)),
    },
    ...(accepted.length === 0
      ? []
      : [
          {
            title: `Accepted findings (${accepted.length})`,
            strips: accepted.map((finding) => findingStrip(look, width, finding)),
          },
        ]),
  ]
}

export const assumedSection = (look: Look, { assumed }: LidContent, width: number): Section[] =>
  assumed.length === 0
    ? []
    : [{ title: 'Unknown or assumed', strips: assumed.map((words) => paragraph(look, width, words)) }]

/** Inlets of backplanes: several work together there, so a drive's row cannot tell which lead is which. */
export function feedSection(look: Look, { feeds }: LidContent, width: number): Section[] {
  if (feeds.length === 0) return []
  const { body_pt } = look.density
  const inlet = Math.min(
    width * 0.35,
    wish(
      feeds.map((feed) => feed.inlet),
      body_pt,
      600,
    ),
  )
  const columns: Column[] = [
    { title: 'Inlet', width: inlet, weight: 600 },
    { title: 'Fed from', width: width - inlet },
  ]
  return [
    {
      title: 'Backplane inlets',
      head: tableHead(look, columns),
      strips: feeds.flatMap((feed) => tableRow(look, columns, [{ words: feed.inlet }, { words: feed.power }])),
    },
  ]
}
