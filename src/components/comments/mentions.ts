import type { Mentionable } from '#shared/contract/comments.ts'

/** The name that is being typed after an @ just before the caret; undefined where none is. */
export function typedMention(text: string, caret: number): { from: number; typed: string } | undefined {
  const match = /(?:^|[\s(])@([\p{L}\p{N} .'-]{0,40})$/u.exec(text.slice(0, caret))
  if (match?.[1] === undefined) return undefined
  return { from: caret - match[1].length - 1, typed: match[1].toLowerCase() }
}

/** People whose name, or a further name of it, begins as typed. */
export const offered = (people: readonly Mentionable[], typed: string): Mentionable[] =>
  people.filter(({ name }) => ` ${name.toLowerCase()}`.includes(` ${typed}`)).slice(0, 6)

/** Names as a person writes them to ids as they are kept: the longest name first, so that none hides in another. */
export function toIds(text: string, people: readonly Mentionable[]): string {
  return [...people]
    .sort((a, b) => b.name.length - a.name.length)
    .reduce((done, { name, userId }) => done.replaceAll(`@${name}`, `@{${userId}}`), text)
}

/** And back, to change a comment; an id without a name stays. */
export const toNames = (text: string, mentions: readonly { userId: string; name: string | null }[]): string =>
  mentions.reduce(
    (done, { userId, name }) => (name === null ? done : done.replaceAll(`@{${userId}}`, `@${name}`)),
    text,
  )
