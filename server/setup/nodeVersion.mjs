import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { root } from './paths.mjs'
import { Refusal } from './refusal.mjs'

/** @param {string} version @returns {[number, number]} */
const majorMinor = (version) => {
  const [major = 0, minor = 0] = version
    .replace(/^[^\d]*/, '')
    .split('.')
    .map(Number)
  return [major, minor]
}

/** Whether `version` reaches the `>=` range of package.json. @param {string} version @param {string} range */
export const reaches = (version, range) => {
  const [major, minor] = majorMinor(version)
  const [leastMajor, leastMinor] = majorMinor(range)
  return major > leastMajor || (major === leastMajor && minor >= leastMinor)
}

/** Refuses a Node.js that is too old to run Bayloom. */
export const checkNodeVersion = async () => {
  const range = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')).engines.node
  if (!reaches(process.versions.node, range))
    throw new Refusal(
      `Bayloom needs Node.js ${range}; this is ${process.versions.node}. Install a newer Node.js and start again.`,
    )
  return { outcome: process.versions.node }
}
