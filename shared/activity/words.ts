import type { Author, Happening } from '../contract/activity.ts'
import type { Notice } from '../contract/notifications.ts'

/** What somebody whose account or link is gone is called. */
export const formerName = 'Former member'

export const authorName = (author: Author): string => (author.kind === 'former' ? formerName : author.name)

/** A name as it stands in lists of what happened: guests are told apart. */
export const authorWords = (author: Author): string =>
  author.kind === 'guest' ? `${author.name} (guest)` : authorName(author)

/** Two letters for a small mark: of first and last name. */
export function initials(name: string): string {
  const names = name.split(/[\s-]+/).filter((part) => /\p{L}|\p{N}/u.test(part))
  const first = [...(names[0] ?? '?')][0] ?? '?'
  const last = names.length > 1 ? ([...(names.at(-1) ?? '')][0] ?? '') : ''
  return (first + last).toUpperCase()
}

const quoted = (text: string): string => (text === '' ? '' : `: "${text}"`)

/** What happened, to go after the name of who did it: "Irma Solberg saved revision 12: Add C7". */
export function happeningWords(what: Happening): string {
  switch (what.kind) {
    case 'revision-saved':
      return `saved revision ${what.revision}${what.label === '' ? '' : `: ${what.label}`}`
    case 'revision-named':
      return what.name === null
        ? `took the name off revision ${what.revision}`
        : `named revision ${what.revision} "${what.name}"`
    case 'revision-restored':
      return `restored revision ${what.restored} as revision ${what.revision}`
    case 'comment-added':
      return `${what.repliesTo.length > 0 ? 'answered' : 'commented'} on ${what.about}${quoted(what.excerpt)}`
    case 'comment-edited':
      return 'changed a comment'
    case 'comment-deleted':
      return 'deleted a comment'
    case 'thread-resolved':
      return `resolved the comments on ${what.about}`
    case 'thread-reopened':
      return `reopened the comments on ${what.about}`
    case 'round-asked':
      return `asked for review ${what.round} of revision ${what.revision}${quoted(what.question)}`
    case 'verdict-given':
      return `${what.verdict === 'approve' ? 'approved' : 'asked for changes in'} revision ${what.revision} (review ${what.round})${quoted(what.summary)}`
    case 'round-closed':
      return `closed review ${what.round}`
    case 'approval-lapsed':
      return `changed the build: the approval of revision ${what.revision} (review ${what.round}) has lapsed`
    case 'member-joined':
      return `joined as ${what.role}`
    case 'member-left':
      return `took ${what.name} out of the build`
    case 'role-changed':
      return `made ${what.name} ${what.role}`
    case 'ownership-transferred':
      return `handed the build over to ${what.name}`
    case 'link-made':
      return `made the link "${what.label}"`
    case 'link-revoked':
      return `revoked the link "${what.label}"`
    case 'guest-joined':
      return 'came by a link'
    case 'build-archived':
      return 'archived the build'
    case 'build-restored':
      return 'took the build out of the archive'
  }
}

/** The same as one sentence, with its author. A person who leaves is not said to be taken out. */
export function activitySentence(by: Author, what: Happening): string {
  if (what.kind === 'member-left' && by.kind === 'member' && by.userId === what.userId)
    return `${authorWords(by)} left the build`
  return `${authorWords(by)} ${happeningWords(what)}`
}

/** A notification in words, to the person who is told. */
export function noticeSentence({ reason, activity }: Pick<Notice, 'reason' | 'activity'>): string {
  const who = authorWords(activity.by)
  const { what } = activity
  if (reason === 'mention' && what.kind === 'comment-added')
    return `${who} mentioned you in the comments on ${what.about}${quoted(what.excerpt)}`
  if (reason === 'review-asked' && what.kind === 'round-asked')
    return `${who} asked you to review revision ${what.revision}${quoted(what.question)}`
  if (what.kind === 'role-changed') return `${who} made you ${what.role}`
  if (what.kind === 'ownership-transferred') return `${who} handed the build over to you`
  return activitySentence(activity.by, what)
}
