import { afterAll, beforeAll, beforeEach, expect, test } from 'vitest'
import { pino } from 'pino'
import { sendMail } from '../../server/jobs/sendMail.ts'
import { invitationMail } from '../../server/mail/templates.ts'
import { Message } from '../../server/models/index.ts'
import { queueMail } from '../../server/services/mailboxService.ts'
import { startApi, type Api } from './support/api.ts'

let api: Api
beforeAll(async () => {
  api = await startApi()
})
afterAll(() => api.close())
beforeEach(async () => {
  await Message.destroy({ where: {} })
})

const log = pino({ level: 'silent' })
const queue = (recipient: string) =>
  api.context.database.transaction((transaction) =>
    queueMail(recipient, { subject: 'S', text: 'T', html: '<p>T</p>' }, transaction),
  )
async function drain(job: () => Promise<boolean>): Promise<void> {
  while (await job());
}

test('each mail is sent once, though several loops work at the same time', async () => {
  for (let i = 0; i < 20; i++) await queue(`to${i}@example.org`)
  const sent: string[] = []
  const job = sendMail(api.context.database, (message) => Promise.resolve(void sent.push(message.recipient)), log)
  await Promise.all([drain(job), drain(job), drain(job)])
  expect(sent.sort()).toEqual(Array.from({ length: 20 }, (_, i) => `to${i}@example.org`).sort())
  expect(await Message.count({ where: { state: 'sent' } })).toBe(20)
})

test('a mail whose cause is undone is never sent', async () => {
  const undone = api.context.database.transaction(async (transaction) => {
    await queueMail('never@example.org', { subject: 'S', text: 'T', html: 'T' }, transaction)
    throw new Error('changed our mind')
  })
  await expect(undone).rejects.toThrow('changed our mind')
  expect(await Message.count()).toBe(0)
})

test('a mail that is not taken over waits longer each time, and is given up at last', async () => {
  await queue('bounce@example.org')
  const job = sendMail(api.context.database, () => Promise.reject(new Error('mailbox full')), log)
  const waits: number[] = []
  for (let i = 0; i < 8; i++) {
    await Message.update({ nextTryAt: new Date(0) }, { where: {} })
    await drain(job)
    const message = await Message.findOne()
    waits.push(message?.nextTryAt.getTime() ?? 0)
    expect(message).toMatchObject({ attempts: i + 1, lastError: 'mailbox full', state: i < 7 ? 'queued' : 'failed' })
  }
  expect(waits).toEqual([...waits].sort((a, b) => a - b))
  await Message.update({ nextTryAt: new Date(0) }, { where: {} })
  expect(await job()).toBe(false)
})

test('a subject stays one line, whatever a build is called', () => {
  const mail = invitationMail({
    buildName: 'x\r\nBcc: all@example.org',
    invitedBy: 'A\nB',
    role: 'reader',
    publicUrl: 'http://plans.example.org',
    token: 'tok',
  })
  expect(mail.subject).toBe('A B invites you to the build "x Bcc: all@example.org"')
})
