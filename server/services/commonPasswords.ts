/** Starts of passwords that are tried first everywhere; digits and marks after them do not help. Lower case. */
const commonStems = [
  'password',
  'passw0rd',
  'p@ssword',
  'p@ssw0rd',
  'passwort',
  'letmein',
  'welcome',
  'qwerty',
  'qwertz',
  'azerty',
  'asdfgh',
  'zxcvbn',
  'iloveyou',
  'football',
  'baseball',
  'basketball',
  'dragon',
  'monkey',
  'sunshine',
  'princess',
  'superman',
  'batman',
  'trustno1',
  'administrator',
  'admin',
  'changeme',
  'change me',
  'default',
  'secret',
  'master',
  'whatever',
  'starwars',
  'computer',
  'internet',
  'michael',
  'jennifer',
  'jordan',
  'charlie',
  'liverpool',
  'chocolate',
  'bayloom',
  'correct horse battery staple',
  'correcthorsebatterystaple',
]

const keyboardRuns = [
  '01234567890123456789012345',
  '98765432109876543210987654',
  'abcdefghijklmnopqrstuvwxyz',
  'qwertyuiopasdfghjklzxcvbnm',
  'qwertzuiopasdfghjklyxcvbnm',
  '1q2w3e4r5t6y7u8i9o0p',
  '1qaz2wsx3edc4rfv5tgb6yhn',
]

/** Why a password is easily guessed, in words; null where nothing is known against it. */
export function passwordWeakness(password: string, email: string, name = ''): string | null {
  const plain = password.toLowerCase()
  const [local = '', domain = ''] = email.toLowerCase().split('@')
  const own = [email.toLowerCase(), local, domain.split('.')[0] ?? '', name.toLowerCase()].filter((w) => w.length > 2)
  if (own.some((word) => remainder(plain, word) < 6)) return 'this is little more than your own e-mail address or name'
  if (commonStems.some((stem) => remainder(plain, stem) < 7)) return 'this is among the passwords that are tried first'
  if (new Set(plain).size < 5) return 'this repeats a few characters'
  if (keyboardRuns.some((run) => longestShared(plain, run) >= plain.length - 4))
    return 'this is a run along the keyboard'
  const half = plain.slice(0, Math.ceil(plain.length / 2))
  if (half.length < 7 && plain === (half + half).slice(0, plain.length)) return 'this repeats one short word'
  return null
}

/** Characters left of a password when every appearance of a word is taken out. Infinite where the word is not in it. */
function remainder(password: string, word: string): number {
  const rest = password.split(word)
  return rest.length === 1 ? Infinity : rest.join('').length
}

/** Length of the longest start of the password that lies along a run. */
function longestShared(password: string, run: string): number {
  for (let length = Math.min(password.length, run.length); length > 0; length--)
    if (run.includes(password.slice(0, length))) return length
  return 0
}
