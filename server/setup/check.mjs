import { runScript } from './script.mjs'

await runScript('server/cli/check.ts', { failed: 2 })
