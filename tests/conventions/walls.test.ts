import { ESLint } from 'eslint'
import { describe, expect, it } from 'vitest'
import { root } from '../../server/setup/paths.mjs'

const eslint = new ESLint({ cwd: root })

/** What the linter says about a file with this text at this place. */
async function complaintsAbout(filePath: string, text: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath: `${root}/${filePath}` })
  return (result?.messages ?? []).map((message) => message.message)
}

const refused: [file: string, text: string, reason: RegExp][] = [
  ['shared/check/probe.ts', "import { readFileSync } from 'node:fs'\nreadFileSync('x')\n", /pure core/],
  ['shared/check/probe.ts', "import { createApp } from 'vue'\ncreateApp({})\n", /pure core/],
  ['shared/check/probe.ts', "export * from '../../server/config.ts'\n", /nothing above it/],
  ['shared/rules/unpowered/probe.ts', "export * from '../../../src/main.ts'\n", /nothing above it/],
  ['shared/check/probe.ts', "export const load = () => import('node:fs')\n", /pure core/],
  [
    'shared/check/probe.ts',
    "import sources from '../../catalog/sources.json'\nexport const all = sources\n",
    /passed in/,
  ],
  ['shared/check/probe.ts', 'export const now = () => Date.now()\n', /no clock/],
  ['shared/check/probe.ts', 'export const now = () => new Date()\n', /no clock/],
  ['shared/check/probe.ts', 'export const dice = () => Math.random()\n', /no chance/],
  ['shared/check/probe.ts', 'export const width = () => window.innerWidth\n', /pure/],
  ['src/api/probe.ts', "export * from '../../server/services/tokens.ts'\n", /talk over HTTP/],
  ['src/api/probe.ts', "export const load = () => import('../../server/app.ts')\n", /talk over HTTP/],
  ['src/api/probe.ts', "export * from 'node:path'\n", /no Node.js in the browser/],
  ['src/api/probe.ts', "export * from 'sequelize'\n", /belongs to the server/],
  ['src/api/probe.ts', "export * from '../../shared/check/check.ts'\n", /#shared/],
  ['server/services/probe.ts', "export * from '../../src/main.ts'\n", /never imports the browser/],
  ['server/services/probe.ts', "export * from 'vue'\n", /belongs to the browser/],
  ['server/services/probe.ts', 'export const home = process.env.HOME\n', /server\/config\.ts/],
  ['tests/server/probe.test.ts', "export const home = process.env['HOME']\n", /server\/config\.ts/],
  ['server/services/probe.ts', 'export default 1\n', /Export by name/],
  ['shared/check/probe.ts', 'export const read = (value: any) => value\n', /Unexpected any/],
  ['tests/shared/probe.test.ts', "import { it } from 'vitest'\nit.only('x', () => {})\n", /Every test runs/],
  [
    'src/components/base/BaseProbe.vue',
    '<script>\nexport default {}\n</script>\n<template><p>x</p></template>\n',
    /'lang'/,
  ],
]

const accepted: [file: string, text: string][] = [
  ['shared/check/probe.ts', "export * from '../catalog/model.ts'\nexport * from 'zod'\nexport * from 'ml-matrix'\n"],
  ['shared/check/probe.ts', 'export const day = (iso: string) => new Date(iso).getUTCDate()\n'],
  ['src/api/probe.ts', "export * from '#shared/contract/session.ts'\nexport * from 'vue'\n"],
  ['server/services/probe.ts', "export * from '#shared/check/check.ts'\nexport * from 'node:path'\n"],
  ['server/config.ts', 'export const home = process.env.HOME\n'],
  ['server/setup/probe.mjs', 'export const home = process.env.HOME\n'],
  ['vite.config.ts', 'export default {}\n'],
]

describe('walls between the rooms', () => {
  it.each(refused)('%s may not hold %j', async (file, text, reason) => {
    expect(await complaintsAbout(file, text)).toContainEqual(expect.stringMatching(reason))
  })

  it.each(accepted)('%s may hold %j', async (file, text) => {
    expect(await complaintsAbout(file, text)).toEqual([])
  })

  it('a comment cannot switch a wall off', async () => {
    const silence = ['eslint', 'disable', 'next', 'line'].join('-')
    const text = `// ${silence} no-restricted-imports\nexport * from 'vue'\n`
    expect(await complaintsAbout('shared/check/probe.ts', text)).toContainEqual(expect.stringMatching(/pure core/))
  })
})
