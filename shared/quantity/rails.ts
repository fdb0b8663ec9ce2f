import { z } from 'zod'

/** The rails that feed drives. The return is one shared conductor and is named apart from them. */
export const rails = ['12V', '5V', '3.3V'] as const
export type Rail = (typeof rails)[number]
export const railSchema = z.enum(rails)

/** A conductor or contact carries one rail or the shared return. */
export const lines = ['12V', '5V', '3.3V', 'return'] as const
export type Line = (typeof lines)[number]
export const lineSchema = z.enum(lines)

export const nominal_V: Readonly<Record<Rail, number>> = { '12V': 12, '5V': 5, '3.3V': 3.3 }
