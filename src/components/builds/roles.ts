import { buildRoles, roleWords, type BuildRole } from '#shared/contract/build.ts'

const names: Readonly<Record<BuildRole, string>> = {
  owner: 'Owner',
  editor: 'Editor',
  reviewer: 'Reviewer',
  reader: 'Reader',
}

/** The roles of a build to choose from, owner first. */
export const roleOptions = buildRoles.map((value) => ({ value, words: names[value] }))

export const roleName = (role: BuildRole): string => names[role]

/** What a role allows, as a sentence about the person who has it. */
export const roleSentence = (role: BuildRole): string => {
  const words = roleWords[role]
  return `${words.charAt(0).toUpperCase()}${words.slice(1)}.`
}
