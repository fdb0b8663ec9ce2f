import { installDebian, mayInstall } from './debian.mjs'
import { findChromium, onPath } from './programs.mjs'
import { Refusal } from './refusal.mjs'

const tools = {
  chromium: { found: () => findChromium() !== null, without: 'the browser tests cannot run' },
  ngspice: {
    found: () => onPath('ngspice') !== null,
    without: 'the power network cannot be held against a circuit simulator',
  },
  'poppler-utils': { found: () => onPath('pdftotext') !== null, without: 'PDF papers cannot be looked into' },
}

/** @typedef {keyof typeof tools} Tool */

/** Makes sure that outside programs are there, by their Debian names. @param {readonly Tool[]} names @param {(text: string) => void} say */
export const ensureTools = async (names, say) => {
  const missing = names.filter((name) => !tools[name].found())
  if (missing.length > 0 && mayInstall()) {
    say(`installing Debian's ${missing.join(', ')}`)
    await installDebian(missing)
  }
  const still = missing.filter((name) => !tools[name].found())
  if (still.length > 0)
    throw new Refusal(
      [
        ...still.map((name) => `${name} is missing: ${tools[name].without}.`),
        `Install it and start again:  apt-get install ${still.join(' ')}   (as root, on Debian)`,
      ].join('\n'),
    )
  return { outcome: missing.length > 0 ? `installed ${missing.join(', ')}` : names.join(', ') }
}
