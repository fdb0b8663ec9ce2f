import type { z } from 'zod'

/** One thing wrong in a document, with its place as "parts[3].bay.slot" ("" for the document itself). */
export interface DocumentProblem {
  path: string
  message: string
}

/** Writes a path the way people read it: `parts[3].bay.slot`. */
export function formatPath(path: readonly PropertyKey[]): string {
  return path.reduce<string>(
    (text, step) =>
      typeof step === 'number' ? `${text}[${step}]` : text === '' ? String(step) : `${text}.${String(step)}`,
    '',
  )
}

/** Turns schema issues into problems, at most `most` of them. Unknown fields are named one by one. */
export function problemsOf(error: z.ZodError, most = 100): DocumentProblem[] {
  const problems: DocumentProblem[] = []
  for (const issue of error.issues) {
    if (problems.length >= most) break
    if (issue.code === 'unrecognized_keys')
      for (const key of issue.keys) problems.push({ path: formatPath([...issue.path, key]), message: 'unknown field' })
    else problems.push({ path: formatPath(issue.path), message: wordsOf(issue) })
  }
  return problems
}

const expectations: Readonly<Record<string, string>> = {
  object: 'an object',
  array: 'a list',
  string: 'a text',
  int: 'a whole number',
}

/** The schema library's own phrases in plain words; what our schemas say themselves stays. */
function wordsOf(issue: z.core.$ZodIssue): string {
  if (issue.code === 'invalid_type' && issue.message.endsWith('received undefined'))
    return `missing, expected ${expectations[issue.expected] ?? `a ${issue.expected}`}`
  if (
    issue.code === 'too_small' &&
    issue.origin === 'string' &&
    issue.minimum === 1 &&
    issue.message.startsWith('Too small')
  )
    return 'is empty'
  return issue.message
}
