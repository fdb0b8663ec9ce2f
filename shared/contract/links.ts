/** Paths of the client that mails link to. */
export const clientPaths = {
  invitation: (token: string): string => `/invitations/${token}`,
  passwordReset: (token: string): string => `/password-resets/${token}`,
} as const
