import type { ResolvedPart } from '#shared/build/resolve.ts'
import { driveWords, tagWords } from '#shared/paper/words.ts'

/** What a part is called on its tag: its own name, else its model's, short. */
export function titleOf(part: ResolvedPart): string {
  const { model } = part
  return model.kind === 'drive' && part.part.name === undefined ? driveWords(model) : tagWords(part.part.name, model)
}
