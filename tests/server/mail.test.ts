import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest'
import { pino } from 'pino'
import { makeJobLoop } from '../../server/jobs/jobLoop.ts'
import { workOff } from '../../server/jobs/queue.ts'
import { sendMail } from '../../server/jobs/sendMail.ts'
import type { MailTransport } from '../../server/mail/transport.ts'
import { invitationMail } from '../../server/mail/templates.ts'
import { Message } from '../../server/models/index.ts'
import { queueMail } from '../../server/services/mailboxService.ts'
import { startApi, type Api } from './support/api.ts'

let api: Api
const logged: string[] = []
const log = pino({ level: 'trace' }, { write: (line: string) => void logged.push(line) })
beforeAll(async () => {
  api = await startApi()
})
afterAll(() => api.close())
beforeEach(async () => {
  logged.length = 0
  await Message.destroy({ where: {} })
  await api.context.database.query('DELETE FROM pgboss.job')
})

const queue = (to: string) =>
  api.context.database.transaction((transaction) =>
    queueMail(api.context, { to, kind: 'other', mail: { subject: 'S', text: 'T', html: '<p>T</p>' } }, transaction),
  )
const jobOf = (transport: MailTransport) =>
  workOff(
    api.context.database,
    'mail',
    sendMail(api.context.database, transport, () => 'https://x.example'),
    log,
  )
async function drain(job: () => Promise<boolean>): Promise<void> {
  while (await job());
}
/** What waits may be tried at once. */
const hurry = () => api.context.database.query("UPDATE pgboss.job SET start_after = now() - interval '1 second'")

test('each mail is sent once, though several loops work at the same time', async () => {
  for (let i = 0; i < 20; i++) await queue(`to${i}@example.org`)
  const sent: string[] = []
  const job = jobOf((message) => Promise.resolve(void sent.push(message.recipient)))
  await Promise.all([drain(job), drain(job), drain(job)])
  expect(sent.sort()).toEqual(Array.from({ length: 20 }, (_, i) => `to${i}@example.org`).sort())
  expect(await Message.count({ where: { state: 'sent' } })).toBe(20)
})

test('a mail whose cause is undone is never sent', async () => {
  const undone = api.context.database.transaction(async (transaction) => {
    const letter = { to: 'never@example.org', kind: 'other', mail: { subject: 'S', text: 'T', html: 'T' } } as const
    await queueMail(api.context, letter, transaction)
    throw new Error('changed our mind')
  })
  await expect(undone).rejects.toThrow('changed our mind')
  expect(await Message.count()).toBe(0)
  expect(await jobOf(() => Promise.resolve())()).toBe(false)
})

test('a process cut off from the database while it sends leaves the mail to the next one, at once', async () => {
  await queue('interrupted@example.org')
  let goOn = () => {}
  let isSending = () => {}
  const sending = new Promise<void>((resolve) => (isSending = resolve))
  const held = new Promise<void>((resolve) => (goOn = resolve))
  const cutOff = jobOf(() => {
    isSending()
    return held
  })()
  await sending
  await api.context.database.query(
    `SELECT pg_terminate_backend(pid) FROM pg_stat_activity
     WHERE datname = current_database() AND state = 'idle in transaction' AND pid <> pg_backend_pid()`,
  )
  const sent: string[] = []
  await drain(jobOf((message) => Promise.resolve(void sent.push(message.recipient))))
  expect(sent).toEqual(['interrupted@example.org'])
  goOn()
  await expect(cutOff).rejects.toThrow()
  expect(await Message.findAll()).toMatchObject([{ state: 'sent', attempts: 1 }])
})

test('a mail that is not taken over waits longer each time, is given up at last, and can be tried again', async () => {
  await queue('bounce@example.org')
  const job = jobOf(() =>
    Promise.reject(Object.assign(new Error('mailbox full'), { rejected: ['bounce@example.org'] })),
  )
  const waits_ms: number[] = []
  for (let i = 0; i < 8; i++) {
    await hurry()
    const before = Date.now()
    await drain(job)
    const message = await Message.findOne()
    if (i < 7) waits_ms.push((message?.nextTryAt.getTime() ?? 0) - before)
    expect(message).toMatchObject({ attempts: i + 1, lastError: 'mailbox full', state: i < 7 ? 'queued' : 'failed' })
  }
  // Each pause is between one and two times the last power of two of a minute, by chance.
  for (const [i, wait_ms] of waits_ms.entries()) {
    expect(wait_ms).toBeGreaterThan(59_000 * 2 ** i)
    expect(wait_ms).toBeLessThan(61_000 * 2 ** (i + 1))
  }
  await hurry()
  expect(await job()).toBe(false)
  expect(logged.filter((line) => line.includes('a job was not done'))).toHaveLength(8)
  expect(logged.join('')).not.toMatch(/bounce@example\.org|mailbox full/)

  const administrator = await api.person({ role: 'administrator' })
  const [shown] = (await administrator.get('/api/mailbox?state=failed')).body as { id: string; lastError: string }[]
  expect(shown?.lastError).toBe('mailbox full')
  const again = await administrator.post(`/api/mailbox/${shown?.id}/again`)
  expect(again.body).toMatchObject({ state: 'queued', attempts: 8 })
  await drain(jobOf(() => Promise.resolve()))
  expect(await Message.findOne()).toMatchObject({ state: 'sent', attempts: 9, lastError: null })
})

test('a slow mail server holds up nothing but mail', async () => {
  let release = () => {}
  const slow = new Promise<void>((resolve) => (release = resolve))
  let checked = 0
  const loop = makeJobLoop({ mail: () => slow.then(() => false), check: () => Promise.resolve(checked++ < 1) }, log)
  loop.start()
  loop.wake()
  await expect.poll(() => checked).toBeGreaterThan(1)
  release()
  await loop.stop()
})

test('a subject stays one line, whatever a build is called', () => {
  const link = { words: 'switch off invitations', link: 'http://plans.example.org/unsubscribe/x' }
  const mail = invitationMail({
    buildName: 'x\r\nBcc: all@example.org',
    invitedBy: 'A\nB',
    role: 'reader',
    publicUrl: 'http://plans.example.org',
    token: 'tok',
    footer: { why: 'Why.', choices: 'http://plans.example.org/account', unsubscribe: link },
  })
  expect(mail.subject).toBe('A B invites you to the build "x Bcc: all@example.org"')
})
