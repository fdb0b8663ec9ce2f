import type { InstallationRole } from '#shared/contract/session.ts'

/** What a person is in this installation, in words. */
export const installationRoleNames: Readonly<Record<InstallationRole, string>> = {
  administrator: 'administrator',
  'catalog-editor': 'catalog editor',
  member: 'member',
}
