import { z } from 'zod'

/** `danger` may hurt people or hardware, `fault` will not work, `caution` works outside good practice, `note` informs. */
export const severities = ['danger', 'fault', 'caution', 'note'] as const
export type Severity = (typeof severities)[number]
export const severitySchema = z.enum(severities)

/** 0 is worst. */
export const severityRank: Readonly<Record<Severity, number>> = { danger: 0, fault: 1, caution: 2, note: 3 }
