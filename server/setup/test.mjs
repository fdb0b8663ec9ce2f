import { buildClient } from './client.mjs'
import { loadEnvironment } from './environment.mjs'
import { closeAtEnd, main } from './main.mjs'
import { checkNodeVersion } from './nodeVersion.mjs'
import { installPackages } from './packages.mjs'
import { makeDataFolder, root } from './paths.mjs'
import { run, tail } from './run.mjs'
import { step } from './steps.mjs'
import { openTestDatabase } from './testDatabase.mjs'
import { ensureTools } from './tools.mjs'
import { runVitest } from './vitestRun.mjs'

const bin = `${root}/node_modules/.bin`

/** What a careful reader would say first: form, habits, types. One count each. */
const checks = [
  { name: 'format', program: `${bin}/prettier`, args: ['--check', '--log-level', 'warn', '.'] },
  { name: 'habits', program: `${bin}/eslint`, args: ['.'] },
  ...[
    'tsconfig.shared.json',
    'tsconfig.server.json',
    'tsconfig.client.json',
    'tsconfig.tests.json',
    'tsconfig.components.json',
  ].map((config) => ({
    name: 'types',
    program: `${bin}/${config.includes('client') || config.includes('components') ? 'vue-tsc' : 'tsc'}`,
    args: ['-p', config],
  })),
]

let passed = 0
let failed = 0

/** @param {(typeof checks)[number]} check */
const runCheck = ({ name, program, args }) =>
  step(name, async () => {
    const { code, output } = await run(program, args)
    if (code === 0) passed++
    else failed++
    const what = name === 'types' ? `${args[1]}: ` : ''
    return { outcome: code === 0 ? `${what}in order` : `${what}FAILED\n${tail(output, 60)}\n ` }
  })

/** Two at a time: each keeps one core busy. */
const runChecks = async () => {
  const waiting = [...checks]
  const work = async () => {
    for (let next = waiting.shift(); next; next = waiting.shift()) await runCheck(next)
  }
  await Promise.all([work(), work()])
}

/** @param {string} name @param {readonly string[]} args @param {string} databaseUrl */
const runTests = (name, args, databaseUrl) =>
  step(name, async (say) => {
    say(`vitest ${args.join(' ')}`)
    const result = await runVitest(args, databaseUrl)
    passed += result.passed
    failed += result.failed
    return {
      outcome: `${result.passed} passed, ${result.failed} failed${result.skipped ? `, ${result.skipped} skipped` : ''}`,
    }
  })

/** Everything in order, or the named test files alone. */
const testEverything = async () => {
  const only = process.argv.slice(2)
  await step('Node.js', checkNodeVersion)
  await step('packages', installPackages)
  await step('tools', (say) => ensureTools(['chromium', 'ngspice', 'poppler-utils'], say))
  const database = await step('database', async (say) => {
    const opened = await openTestDatabase(say)
    return { outcome: opened.outcome, value: opened }
  })
  closeAtEnd(database.close)
  if (only.length > 0) return runTests('tests', only, database.url)
  await runChecks()
  await runTests('tests', ['--project', 'shared', '--project', 'server', '--project', 'pages'], database.url)
  await step('pages', buildClient)
  await runTests('journeys', ['--project', 'journeys'], database.url)
}

await main(async () => {
  console.log('\nBayloom, tests\n')
  makeDataFolder()
  loadEnvironment()
  try {
    await testEverything()
  } catch (error) {
    failed++
    console.error(error instanceof Error ? error.message : error)
  }
  await new Promise((done) => process.stdout.write(`\n${passed} passed, ${failed} failed\n`, done))
  return failed > 0 || passed === 0 ? 1 : 0
})
