import { installDebian, mayInstall } from './debian.mjs'
import { postgresServers } from './programs.mjs'
import { Refusal } from './refusal.mjs'

/** The PostgreSQL servers of this machine; installs Debian's where there is none and we may. @param {(text: string) => void} say */
export const debianPostgres = async (say) => {
  const there = postgresServers()
  if (there.length > 0) return there
  if (!mayInstall())
    throw new Refusal(
      [
        'PostgreSQL is not installed, and this account may not install it. Do one of these and start again:',
        '    apt-get install postgresql        (as root, on Debian)',
        '    DATABASE_URL=postgres://...       (a database that you have, in the environment or in .env)',
      ].join('\n'),
    )
  say("installing Debian's postgresql")
  await installDebian(['postgresql'])
  const installed = postgresServers()
  if (installed.length === 0)
    throw new Refusal('apt-get installed postgresql, but its server programs are not where they should be.')
  return installed
}
