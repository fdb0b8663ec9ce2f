import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import {
  mailKindFacts,
  mailKinds,
  type MailChoices,
  type MailKind,
  type MailTiming,
  type Subscription,
} from '#shared/contract/mailChoices.ts'
import { clientPaths } from '#shared/contract/links.ts'
import type { Footer } from '../mail/compose.ts'
import type { Context } from './context.ts'
import { nextDigest } from './digestTimes.ts'
import { Refusal } from './refusal.ts'
import { sameText, tag } from './tokens.ts'

type Held = Pick<Context, 'database'>

const inside = (transaction: Transaction | undefined) => (transaction ? { transaction } : {})

/** What an address wants to get of each kind. */
export async function mailChoices({ database }: Held, email: string): Promise<MailChoices> {
  const rows = await database.query<{ kind: MailKind; timing: MailTiming }>(
    'SELECT kind, timing FROM mail_choices WHERE email = $1',
    { bind: [email], type: QueryTypes.SELECT },
  )
  const chosen = new Map(rows.map((row) => [row.kind, row.timing]))
  return Object.fromEntries(
    mailKinds.map((kind) => [kind, chosen.get(kind) ?? mailKindFacts[kind].usual]),
  ) as MailChoices
}

/** What each of these addresses wants to get of one kind; those not named want the usual. */
export async function timingsOf(
  database: Sequelize,
  kind: MailKind,
  emails: readonly string[],
  transaction: Transaction,
): Promise<(email: string) => MailTiming> {
  const rows = await database.query<{ email: string; timing: MailTiming }>(
    'SELECT email, timing FROM mail_choices WHERE kind = $1 AND email = ANY($2)',
    { bind: [kind, [...emails]], type: QueryTypes.SELECT, transaction },
  )
  const chosen = new Map(rows.map((row) => [row.email, row.timing]))
  return (email) => chosen.get(email) ?? mailKindFacts[kind].usual
}

/** Changes one choice. What it was before is kept, so that it can be taken back. */
export async function chooseMail(
  context: Held,
  email: string,
  kind: MailKind,
  timing: MailTiming,
  transaction?: Transaction,
): Promise<Subscription> {
  await context.database.query(
    `INSERT INTO mail_choices (email, kind, timing, before) VALUES ($1, $2, $3, $4)
     ON CONFLICT (email, kind) DO UPDATE SET timing = $3,
       before = CASE WHEN mail_choices.timing = $3 THEN mail_choices.before ELSE mail_choices.timing END`,
    { bind: [email, kind, timing, mailKindFacts[kind].usual], ...inside(transaction) },
  )
  if (kind === 'digest')
    await context.database.query(
      'UPDATE digests SET next_at = $2 FROM users u WHERE u.id = digests.user_id AND u.email = $1',
      { bind: [email, nextDigest(timing, new Date())], ...inside(transaction) },
    )
  return { kind, timing }
}

/** The secret part of an unsubscribe link: good for one kind of mail to one address, for as long as there are mails. */
export function unsubscribeToken(context: Pick<Context, 'secrets'>, email: string, kind: MailKind): string {
  const what = `${kind}.${Buffer.from(email).toString('base64url')}`
  return `${what}.${tag(context.secrets.unsubscribe, what)}`
}

function readToken(context: Pick<Context, 'secrets'>, token: string): { email: string; kind: MailKind } {
  const [kind = '', address = '', seal = ''] = token.split('.')
  const known = mailKinds.find((one) => one === kind)
  if (!known || !sameText(seal, tag(context.secrets.unsubscribe, `${kind}.${address}`))) throw new Refusal('not-found')
  return { kind: known, email: Buffer.from(address, 'base64url').toString() }
}

/** Switches off what a link stands for. Done twice it is done once. */
export async function unsubscribe(context: Context, token: string): Promise<Subscription> {
  const { email, kind } = readToken(context, token)
  context.log.info({ kind }, 'unsubscribed by link')
  return chooseMail(context, email, kind, 'never')
}

/** Takes that back: it is as before. */
export async function resubscribe(context: Context, token: string): Promise<Subscription> {
  const { email, kind } = readToken(context, token)
  const rows = await context.database.query<{ before: MailTiming | null }>(
    'SELECT before FROM mail_choices WHERE email = $1 AND kind = $2',
    { bind: [email, kind], type: QueryTypes.SELECT },
  )
  const before = rows[0]?.before
  return chooseMail(context, email, kind, before && before !== 'never' ? before : mailKindFacts[kind].usual)
}

/** The foot of a mail of some kind: why it came, and the ways not to get it. */
export function mailFooter(
  context: Pick<Context, 'secrets' | 'publicUrl'>,
  email: string,
  kind: MailKind,
  why: string,
): { footer: Footer; token: string } {
  const token = unsubscribeToken(context, email, kind)
  return {
    token,
    footer: {
      why,
      choices: `${context.publicUrl}/account`,
      unsubscribe: {
        words: `switch off ${mailKindFacts[kind].off}`,
        link: context.publicUrl + clientPaths.unsubscribe(token),
      },
    },
  }
}
