import { clientPaths } from '#shared/contract/links.ts'
import { roleWords, type BuildRole } from '#shared/contract/build.ts'

export interface Mail {
  subject: string
  text: string
  html: string
}

/** A link to set a new password. */
export function passwordResetMail(about: { name: string; publicUrl: string; token: string }): Mail {
  return compose('Set a new Bayloom password', `Hello ${about.name},`, [
    'somebody, probably you, asked to set a new password for your Bayloom account.',
    { link: about.publicUrl + clientPaths.passwordReset(about.token), words: 'Set a new password' },
    'The link works once, within the next hour. If it was not you, do nothing: your password stays as it is.',
  ])
}

/** An invitation into a build. */
export function invitationMail(about: {
  buildName: string
  invitedBy: string
  role: BuildRole
  publicUrl: string
  token: string
}): Mail {
  return compose(`${about.invitedBy} invites you to the build "${about.buildName}"`, 'Hello,', [
    `${about.invitedBy} asks you to join the build "${about.buildName}" as ${about.role}: ${roleWords[about.role]}.`,
    { link: about.publicUrl + clientPaths.invitation(about.token), words: 'Open the build' },
    'The link is meant for this e-mail address and works for the next 14 days.',
  ])
}

type Paragraph = string | { link: string; words: string }

function compose(subject: string, greeting: string, paragraphs: readonly Paragraph[]): Mail {
  const text = paragraphs.map((p) => (typeof p === 'string' ? p : `${p.words}:\n${p.link}`))
  const html = paragraphs.map((p) =>
    typeof p === 'string'
      ? `<p>${escapeHtml(p)}</p>`
      : `<p><a href="${escapeHtml(p.link)}">${escapeHtml(p.words)}</a></p>`,
  )
  return {
    subject: oneLine(subject),
    text: [greeting, ...text, 'Bayloom'].join('\n\n') + '\n',
    html: [`<p>${escapeHtml(greeting)}</p>`, ...html, '<p>Bayloom</p>'].join('\n'),
  }
}

/** A subject is one header line: what people typed into names must not start another. */
const oneLine = (text: string): string => text.replace(/\p{Cc}+/gu, ' ').slice(0, 200)

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
}
const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (sign) => entities[sign] ?? sign)
