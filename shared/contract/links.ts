/** Paths of the client that mails and links lead to. */
export const clientPaths = {
  invitation: (token: string): string => `/invitations/${token}`,
  passwordReset: (token: string): string => `/password-resets/${token}`,
  unsubscribe: (token: string): string => `/unsubscribe/${token}`,
  link: (token: string): string => `/links/${token}`,
} as const
