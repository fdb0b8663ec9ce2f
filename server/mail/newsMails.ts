import { buildPath, placeOf } from '#shared/activity/place.ts'
import { activitySentence, authorWords } from '#shared/activity/words.ts'
import { gatherActivity, lineSentence } from '#shared/activity/gather.ts'
import type { Activity } from '#shared/contract/activity.ts'
import type { NoticeReason } from '#shared/contract/notifications.ts'
import { button, compose, quote, words, type Block, type Footer, type Mail } from './compose.ts'

interface NewsAbout {
  to: string
  buildName: string
  line: Activity
  reason: NoticeReason
  publicUrl: string
  footer: Footer
}

/** A mail about one thing that happened. */
export function newsMail({ to, buildName, line, reason, publicUrl, footer }: NewsAbout): Mail {
  const who = authorWords(line.by)
  const { subject, blocks, act } = telling(who, buildName, line, reason)
  const link = publicUrl + buildPath(line.buildId, placeOf(line.what))
  return compose(subject, `Hello ${to},`, [...blocks, button(act, link)], footer)
}

function telling(
  who: string,
  buildName: string,
  { by, what }: Activity,
  reason: NoticeReason,
): { subject: string; blocks: Block[]; act: string } {
  const build = `"${buildName}"`
  switch (what.kind) {
    case 'round-asked':
      return {
        subject: `${who} asks you to review ${build}`,
        blocks: [words(`${who} asks you to look at revision ${what.revision} of ${build}.`), ...quote(what.question)],
        act: 'Open the review',
      }
    case 'verdict-given': {
      const did = what.verdict === 'approve' ? 'approved' : 'asks for changes in'
      return {
        subject: `${who} ${did} revision ${what.revision} of ${build}`,
        blocks: [words(`${who} ${did} revision ${what.revision} of ${build}.`), ...quote(what.summary)],
        act: 'Open the review',
      }
    }
    case 'approval-lapsed':
      return {
        subject: `The approval of ${build} has lapsed`,
        blocks: [
          words(
            `Revision ${what.revision} of ${build} was approved. ${who} has changed the build since: the approval no longer holds for what it is now.`,
          ),
        ],
        act: 'See what changed',
      }
    case 'comment-added':
      return {
        subject:
          reason === 'mention'
            ? `${who} mentions you in ${build}, on ${what.about}`
            : `${who} ${what.repliesTo.length > 0 ? 'answered' : 'commented'} in ${build}, on ${what.about}`,
        blocks: [words(`${who} wrote about ${what.about} in ${build}:`), ...quote(what.excerpt)],
        act: 'Open the comments',
      }
    default:
      return {
        subject: `${buildName}: ${activitySentence(by, what)}`,
        blocks: [words(`${activitySentence(by, what)} (${build}).`)],
        act: 'Open the build',
      }
  }
}

/** Lines of one build that a digest shows at most. */
const mostLines = 12

export interface DigestPart {
  buildId: string
  buildName: string
  /** Newest first. */
  lines: readonly Activity[]
}

/** What others did in one's builds, and what concerns one personally on top. */
export function digestMail(about: {
  to: string
  rhythm: 'daily' | 'weekly'
  personal: readonly { buildName: string; line: Activity }[]
  builds: readonly DigestPart[]
  publicUrl: string
  footer: Footer
}): Mail {
  const linkOf = ({ buildId, what }: Activity) => about.publicUrl + buildPath(buildId, placeOf(what))
  const span = about.rhythm === 'daily' ? 'since yesterday' : 'this week'
  const personal: Block[] =
    about.personal.length === 0
      ? []
      : [
          {
            kind: 'list',
            title: 'For you',
            items: about.personal.slice(0, mostLines).map(({ buildName, line }) => ({
              words: `${buildName}: ${activitySentence(line.by, line.what)}`,
              link: linkOf(line),
            })),
            more: Math.max(0, about.personal.length - mostLines),
          },
        ]
  const builds = about.builds.map(({ buildName, lines }): Block => {
    const gathered = gatherActivity(lines)
    return {
      kind: 'list',
      title: buildName,
      items: gathered.slice(0, mostLines).map((line) => ({ words: lineSentence(line), link: linkOf(line.newest) })),
      more: Math.max(0, gathered.length - mostLines),
    }
  })
  const names = about.builds.map(({ buildName }) => buildName)
  const subject = names.length === 1 ? `"${names[0]}" ${span}` : `Your builds ${span}: ${names.length} with changes`
  return compose(
    names.length === 0 ? `For you ${span}` : subject,
    `Hello ${about.to},`,
    [words(`this is what others did in your builds ${span}.`), ...personal, ...builds],
    about.footer,
  )
}
