import { z } from 'zod'
import { saveAnswerSchema, type SaveAnswer } from '#shared/contract/build.ts'
import {
  comparisonSchema,
  openRevisionSchema,
  revisionSchema,
  type Comparison,
  type DescribeRevisionRequest,
  type RestoreRevisionRequest,
  type Revision,
} from '#shared/contract/revisions.ts'
import { request, step } from './client.ts'

export type OpenRevision = z.infer<typeof openRevisionSchema>

const path = (buildId: string, rest: string): string => `/api/builds/${step(buildId)}${rest}`

/** The newest revisions, or those older than `before`. */
export const listRevisions = (
  buildId: string,
  query: { before?: number; named?: 'yes' | 'no' } = {},
  signal?: AbortSignal,
): Promise<Revision[]> => request(z.array(revisionSchema), 'GET', path(buildId, '/revisions'), { query, signal })

export const readRevision = (buildId: string, revision: number, signal?: AbortSignal): Promise<OpenRevision> =>
  request(openRevisionSchema, 'GET', path(buildId, `/revisions/${revision}`), { signal })

export const describeRevision = (
  buildId: string,
  revision: number,
  words: DescribeRevisionRequest,
): Promise<Revision> => request(revisionSchema, 'PATCH', path(buildId, `/revisions/${revision}`), { body: words })

/** Refused with code `conflict` where others changed the same since `base`. */
export const restoreRevision = (
  buildId: string,
  revision: number,
  wanted: RestoreRevisionRequest,
): Promise<SaveAnswer> =>
  request(saveAnswerSchema, 'POST', path(buildId, `/revisions/${revision}/restore`), { body: wanted })

/** Without `to`: against the newest revision. */
export const compareRevisions = (
  buildId: string,
  from: number,
  to: number | undefined,
  signal?: AbortSignal,
): Promise<Comparison> =>
  request(comparisonSchema, 'GET', path(buildId, '/comparison'), { query: { from, to }, signal })
