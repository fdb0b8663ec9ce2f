import { runScript } from './script.mjs'

await runScript('tests/bench/index.ts', { tools: ['ngspice'] })
