import type { BuildDocument, Part } from '#shared/build/document.ts'

/** Whether two states of a document have the same picture: same things at the same places, joined alike. */
export function looksAlike(a: BuildDocument, b: BuildDocument): boolean {
  return (
    a.parts.length === b.parts.length &&
    a.joints.length === b.joints.length &&
    a.models.length === b.models.length &&
    a.models.every((model, i) => model === b.models[i]) &&
    a.joints.every((joint, i) => joint === b.joints[i]) &&
    a.parts.every((part, i) => standsAlike(part, b.parts[i]))
  )
}

function standsAlike(a: Part, b: Part | undefined): boolean {
  if (a === b) return true
  return (
    b !== undefined &&
    a.id === b.id &&
    a.model === b.model &&
    a.position?.x === b.position?.x &&
    a.position?.y === b.position?.y &&
    a.bay?.case === b.bay?.case &&
    a.bay?.slot === b.bay?.slot
  )
}
