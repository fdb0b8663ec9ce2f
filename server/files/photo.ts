import sharp from 'sharp'
import { Refusal } from '../services/refusal.ts'

/** Longest side of a kept photo: a label stays readable, a phone's picture becomes some hundred kilobytes. */
const longestSide_px = 1600
/** Pixels that are unpacked at most: more than any phone takes, less than what fills the memory. */
const mostPixels = 100e6

/** First bytes of the kinds of picture that are taken; whatever the sender calls them. */
const signatures: readonly (readonly [offset: number, bytes: readonly number[]][])[] = [
  [[0, [0xff, 0xd8, 0xff]]],
  [[0, [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]]],
  [
    [0, [0x52, 0x49, 0x46, 0x46]],
    [8, [0x57, 0x45, 0x42, 0x50]],
  ],
]

const isPicture = (bytes: Buffer): boolean =>
  signatures.some((parts) => parts.every(([offset, part]) => part.every((byte, i) => bytes[offset + i] === byte)))

/**
 * Draws a picture anew: turned upright, bounded, without place, time or camera. What does not unpack as a JPEG, PNG or
 * WebP is refused.
 */
export async function redrawPhoto(bytes: Buffer): Promise<Buffer> {
  if (!isPicture(bytes))
    throw new Refusal('bad-input', { detail: 'Not a picture that can be read: JPEG, PNG or WebP.' })
  try {
    return await sharp(bytes, { limitInputPixels: mostPixels, failOn: 'error' })
      .rotate()
      .resize(longestSide_px, longestSide_px, { fit: 'inside', withoutEnlargement: true })
      .webp({ quality: 82 })
      .toBuffer()
  } catch (cause) {
    throw new Refusal('bad-input', { detail: 'The picture is damaged or far too large.', cause })
  }
}
