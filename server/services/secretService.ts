import { randomBytes } from 'node:crypto'
import { QueryTypes, type Sequelize } from 'sequelize'
import { tag } from './tokens.ts'

/** Keys made from the installation's one secret; each purpose has its own. */
export interface Secrets {
  accessToken: string
  csrf: string
  unsubscribe: string
}

/** The given secret, or the installation's own: made at random once and kept in the database. */
export async function loadSecrets(database: Sequelize, given: string | null): Promise<Secrets> {
  const secret = given ?? (await ownSecret(database))
  return {
    accessToken: tag(secret, 'access-token'),
    csrf: tag(secret, 'csrf'),
    unsubscribe: tag(secret, 'unsubscribe'),
  }
}

async function ownSecret(database: Sequelize): Promise<string> {
  await database.query("INSERT INTO secrets (name, value) VALUES ('installation', $1) ON CONFLICT DO NOTHING", {
    bind: [randomBytes(48).toString('base64url')],
  })
  const rows = await database.query<{ value: string }>("SELECT value FROM secrets WHERE name = 'installation'", {
    type: QueryTypes.SELECT,
  })
  const secret = rows[0]?.value
  if (secret === undefined) throw new Error('the installation secret could not be made')
  return secret
}
