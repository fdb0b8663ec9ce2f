import { randomUUID } from 'node:crypto'
import jwt from 'jsonwebtoken'
import { QueryTypes, type Transaction } from 'sequelize'
import type { InstallationRole, User as UserView } from '#shared/contract/session.ts'
import { RefreshToken, Session, User } from '../models/index.ts'
import type { Context } from './context.ts'
import { hashPassword, isOutdated, verifyPassword } from './passwordService.ts'
import { Refusal } from './refusal.ts'
import { hashToken, makeToken } from './tokens.ts'

const minutes = 60_000
const days = 24 * 60 * minutes

/** How long the parts of a session hold. A session ends for good after `session`, used or not. */
export const sessionTimes_ms = {
  access: 10 * minutes,
  refresh: 7 * days,
  session: 30 * days,
  /** A tab that asks with the token just replaced is let in for this long: its answer crossed another tab's. */
  reuseGrace: 30_000,
} as const

const jwtOptions = { issuer: 'bayloom', audience: 'bayloom', algorithm: 'HS256' } as const

/** Who is signed in, in which session. */
export interface SignedIn {
  sessionId: string
  user: UserView
}

/** A session to be written into cookies. `refreshToken` is null where the browser keeps the one it has. */
export interface IssuedSession extends SignedIn {
  accessToken: string
  refreshToken: string | null
}

/** Signs a person in. The answer and its time are the same whether the account exists or not. */
export async function signIn(context: Context, email: string, password: string): Promise<IssuedSession> {
  const user = await User.findOne({ where: { email } })
  const usable = user !== null && user.disabledAt === null && (context.config.demo || !user.demo)
  const matches = await verifyPassword(usable ? user.passwordHash : null, password)
  if (!usable || !matches) throw new Refusal('wrong-credentials')
  if (isOutdated(user.passwordHash)) await user.update({ passwordHash: await hashPassword(password) })
  return context.database.transaction((transaction) => openSession(context, user, transaction))
}

/** Opens a session for an account. */
export async function openSession(context: Context, user: User, transaction: Transaction): Promise<IssuedSession> {
  const now = Date.now()
  const session = await Session.create(
    { id: randomUUID(), userId: user.id, expiresAt: new Date(now + sessionTimes_ms.session) },
    { transaction },
  )
  await user.update({ lastSeenAt: new Date(now) }, { transaction })
  context.log.info({ user: user.id, session: session.id }, 'signed in')
  const refreshToken = await addRefreshToken(session.id, transaction)
  return issue(context, { sessionId: session.id, user: toUserView(user) }, refreshToken)
}

/** Ends a session at once, for every tab that holds it. */
export async function endSession(sessionId: string, because: string): Promise<void> {
  await Session.update(
    { revokedAt: new Date(), revokedBecause: because },
    { where: { id: sessionId, revokedAt: null } },
  )
}

/** Ends a person's sessions, but for one that is kept. */
export async function endSessionsOf(
  userId: string,
  because: string,
  transaction: Transaction,
  keep: string | null = null,
): Promise<void> {
  await Session.sequelize?.query(
    `UPDATE sessions SET revoked_at = now(), revoked_because = $2
     WHERE user_id = $1 AND revoked_at IS NULL AND ($3::uuid IS NULL OR id <> $3::uuid)`,
    { bind: [userId, because, keep], transaction },
  )
}

/** Reads an access token. The session behind it is looked up, so that sign-out and disabling count at once. */
export async function readAccessToken(context: Context, token: string): Promise<SignedIn | null> {
  const sessionId = verifiedSessionId(context, token)
  return sessionId === null ? null : findSession(context, sessionId)
}

function verifiedSessionId(context: Context, token: string): string | null {
  try {
    const { algorithm, ...expected } = jwtOptions
    const claims = jwt.verify(token, context.secrets.accessToken, { ...expected, algorithms: [algorithm] })
    return typeof claims === 'object' && typeof claims['sid'] === 'string' ? claims['sid'] : null
  } catch {
    return null
  }
}

type SessionRow = { id: string; email: string; name: string; role: InstallationRole }

async function findSession(context: Context, sessionId: string, transaction?: Transaction): Promise<SignedIn | null> {
  const rows = await context.database.query<SessionRow>(
    `SELECT u.id, u.email, u.name, u.role
     FROM sessions s JOIN users u ON u.id = s.user_id
     WHERE s.id = $1 AND s.revoked_at IS NULL AND s.expires_at > now()
       AND u.disabled_at IS NULL AND ($2 OR NOT u.demo)`,
    { bind: [sessionId, context.config.demo], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  const user = rows[0]
  return user ? { sessionId, user } : null
}

/**
 * Exchanges a refresh token for the next one. A token that was exchanged before is a sign of theft: the whole session
 * ends, unless it comes within the grace left to tabs that ask at the same moment.
 */
export async function refreshSession(context: Context, token: string): Promise<IssuedSession | null> {
  return context.database.transaction(async (transaction) => {
    const stored = await RefreshToken.findByPk(hashToken(token), { transaction, lock: transaction.LOCK.UPDATE })
    if (!stored || stored.expiresAt.getTime() <= Date.now()) return null
    const signedIn = await findSession(context, stored.sessionId, transaction)
    if (!signedIn) return null
    if (stored.replacedAt !== null) {
      if (Date.now() - stored.replacedAt.getTime() <= sessionTimes_ms.reuseGrace) return issue(context, signedIn, null)
      await Session.update(
        { revokedAt: new Date(), revokedBecause: 'refresh token used twice' },
        { where: { id: stored.sessionId }, transaction },
      )
      context.log.warn({ session: stored.sessionId, user: signedIn.user.id }, 'refresh token used twice: session ended')
      return null
    }
    await stored.update({ replacedAt: new Date() }, { transaction })
    const lastSeenAt = new Date()
    await User.update({ lastSeenAt }, { where: { id: signedIn.user.id }, transaction })
    await Session.update({ lastSeenAt }, { where: { id: stored.sessionId }, transaction })
    return issue(context, signedIn, await addRefreshToken(stored.sessionId, transaction))
  })
}

async function addRefreshToken(sessionId: string, transaction: Transaction): Promise<string> {
  const token = makeToken()
  await RefreshToken.create(
    { tokenHash: hashToken(token), sessionId, expiresAt: new Date(Date.now() + sessionTimes_ms.refresh) },
    { transaction },
  )
  return token
}

function issue(context: Context, signedIn: SignedIn, refreshToken: string | null): IssuedSession {
  const accessToken = jwt.sign({ sid: signedIn.sessionId }, context.secrets.accessToken, {
    ...jwtOptions,
    subject: signedIn.user.id,
    expiresIn: sessionTimes_ms.access / 1000,
  })
  return { ...signedIn, accessToken, refreshToken }
}

/** What others and the person themself see of an account. */
export const toUserView = (user: User): UserView => ({
  id: user.id,
  email: user.email,
  name: user.name,
  role: user.role,
})
