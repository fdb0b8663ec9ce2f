import { clientPaths } from '#shared/contract/links.ts'
import { roleWords, type BuildRole } from '#shared/contract/build.ts'
import { button, compose, words, type Footer, type Mail } from './compose.ts'

export type { Mail } from './compose.ts'

/** A link to set a new password. It comes only when asked for, so there is nothing to unsubscribe from. */
export function passwordResetMail(about: { name: string; publicUrl: string; token: string }): Mail {
  return compose(
    'Set a new Bayloom password',
    `Hello ${about.name},`,
    [
      words('somebody, probably you, asked to set a new password for your Bayloom account.'),
      button('Set a new password', about.publicUrl + clientPaths.passwordReset(about.token)),
      words('The link works once, within the next hour. If it was not you, do nothing: your password stays as it is.'),
    ],
    null,
  )
}

/** An invitation into a build. */
export function invitationMail(about: {
  buildName: string
  invitedBy: string
  role: BuildRole
  publicUrl: string
  token: string
  footer: Footer
}): Mail {
  return compose(
    `${about.invitedBy} invites you to the build "${about.buildName}"`,
    'Hello,',
    [
      words(
        `${about.invitedBy} asks you to join the build "${about.buildName}" as ${about.role}: ${roleWords[about.role]}.`,
      ),
      button('Open the build', about.publicUrl + clientPaths.invitation(about.token)),
      words('The link is meant for this e-mail address and works for the next 14 days.'),
    ],
    about.footer,
  )
}
