import { runScript } from './script.mjs'

await runScript('tests/fuzz/index.ts', { tools: ['ngspice'] })
