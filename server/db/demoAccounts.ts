import type { BuildRole } from '#shared/contract/build.ts'
import type { InstallationRole } from '#shared/contract/session.ts'

export interface DemoAccount {
  id: string
  email: string
  name: string
  password: string
  role: InstallationRole
  /** Role in the demo builds; null: none. */
  buildRole: BuildRole | null
  what: string
}

/** Invented people of the demo. Their passwords are published: the demo is there to be looked at, not to be used. */
export const demoAccounts: readonly DemoAccount[] = [
  {
    id: '0d3a0000-0000-4000-8000-000000000001',
    email: 'irma@reelvault.example',
    name: 'Irma Solberg',
    password: 'splice-and-rewind-7',
    role: 'member',
    buildRole: 'owner',
    what: 'Builder: owns the demo builds',
  },
  {
    id: '0d3a0000-0000-4000-8000-000000000002',
    email: 'teo@reelvault.example',
    name: 'Teo Marchetti',
    password: 'splice-and-rewind-8',
    role: 'member',
    buildRole: 'editor',
    what: 'Editor: changes the diagrams',
  },
  {
    id: '0d3a0000-0000-4000-8000-000000000003',
    email: 'noor@reelvault.example',
    name: 'Noor Castellan',
    password: 'splice-and-rewind-9',
    role: 'member',
    buildRole: 'reviewer',
    what: 'Reviewer: comments and gives verdicts',
  },
  {
    id: '0d3a0000-0000-4000-8000-000000000004',
    email: 'wim@reelvault.example',
    name: 'Wim Achterberg',
    password: 'splice-and-rewind-10',
    role: 'member',
    buildRole: 'reader',
    what: 'Reader: looks and prints',
  },
  {
    id: '0d3a0000-0000-4000-8000-000000000005',
    email: 'pilar@reelvault.example',
    name: 'Pilar Ostrom',
    password: 'splice-and-rewind-11',
    role: 'catalog-editor',
    buildRole: null,
    what: 'Catalog editor: adds and corrects part models',
  },
  {
    id: '0d3a0000-0000-4000-8000-000000000006',
    email: 'admin@reelvault.example',
    name: 'Ansel Dube',
    password: 'splice-and-rewind-12',
    role: 'administrator',
    buildRole: null,
    what: 'Administrator: people, roles, mailbox',
  },
]
