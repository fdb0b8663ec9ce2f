import { describe, expect, test } from 'vitest'
import { ConfigError, readConfig } from '../../server/config.ts'

const least = { DATABASE_URL: 'postgres://bayloom@127.0.0.1:5432/bayloom' }

describe('settings', () => {
  test('need only a database; the rest has defaults', () => {
    expect(readConfig(least)).toMatchObject({ port: 3000, host: '127.0.0.1', demo: true, prepare: false, secret: null })
  })

  test('that are empty count as not given', () => {
    expect(readConfig({ ...least, PORT: '', SMTP_URL: '' })).toMatchObject({ port: 3000, smtpUrl: null })
  })

  test('that are wrong are all named, each with what it means', () => {
    const wrong = { PORT: 'eighty', BAYLOOM_DEMO: 'yes', BAYLOOM_SECRET: 'short', LOG_LEVEL: 'loud' }
    const read = () => readConfig(wrong)
    expect(read).toThrow(ConfigError)
    for (const name of ['DATABASE_URL', 'PORT', 'BAYLOOM_DEMO', 'BAYLOOM_SECRET', 'LOG_LEVEL'])
      expect(read).toThrow(new RegExp(`^  ${name}: .+\\. .+\\.$`, 'm'))
  })

  test('never repeat a secret in the message', () => {
    const secret = 'not-thirty-two-characters'
    let message = ''
    try {
      readConfig({ ...least, BAYLOOM_SECRET: secret })
    } catch (error) {
      message = (error as Error).message
    }
    expect(message).toContain('BAYLOOM_SECRET')
    expect(message).not.toContain(secret)
  })

  test('take the public address without its trailing slash', () => {
    expect(readConfig({ ...least, PUBLIC_URL: 'https://plans.example.org/' }).publicUrl).toBe(
      'https://plans.example.org',
    )
    expect(() => readConfig({ ...least, PUBLIC_URL: 'javascript:alert(1)' })).toThrow(ConfigError)
  })
})
