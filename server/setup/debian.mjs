import { onPath } from './programs.mjs'
import { Refusal } from './refusal.mjs'
import { run, tail } from './run.mjs'

/** Whether this process may install Debian packages. */
export const mayInstall = () => process.getuid?.() === 0 && onPath('apt-get') !== null

/** @param {readonly string[]} args */
const apt = (args) =>
  run('apt-get', ['-o', 'DPkg::Lock::Timeout=120', '-qq', ...args], {
    cwd: '/',
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
  })

/** Installs Debian packages; refreshes the lists only where the first try does not find them. @param {readonly string[]} names */
export const installDebian = async (names) => {
  const install = () => apt(['install', '-y', '--no-install-recommends', ...names])
  if ((await install()).code === 0) return
  await apt(['update'])
  const { code, output } = await install()
  if (code !== 0) throw new Refusal(`apt-get could not install ${names.join(' ')}:\n${tail(output)}`)
}
