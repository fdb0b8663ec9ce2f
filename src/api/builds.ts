import { z } from 'zod'
import {
  buildListSchema,
  buildSummarySchema,
  openBuildSchema,
  saveAnswerSchema,
  type BuildList,
  type BuildSummary,
  type SaveAnswer,
  type SaveRequest,
} from '#shared/contract/build.ts'
import { request, step } from './client.ts'

export type OpenBuild = z.infer<typeof openBuildSchema>
export interface BuildsQuery {
  search?: string
  sort?: 'changed' | 'name' | 'worst' | 'drives'
  archived?: 'no' | 'yes'
  page?: number
  pageSize?: number
}

const path = (buildId: string, rest = ''): string => `/api/builds/${step(buildId)}${rest}`

export const listBuilds = (query: BuildsQuery, signal?: AbortSignal): Promise<BuildList> =>
  request(buildListSchema, 'GET', '/api/builds', { query: { ...query }, signal })

export const createBuild = (wanted: { name: string; example?: string }): Promise<OpenBuild> =>
  request(openBuildSchema, 'POST', '/api/builds', { body: wanted })

/** Refused with code `unreadable-document` and `errors` by path where the document cannot be read. */
export const importBuild = (document: unknown, name?: string): Promise<OpenBuild> =>
  request(openBuildSchema, 'POST', '/api/builds/import', { body: { document, name } })

export const openBuild = (buildId: string, signal?: AbortSignal): Promise<OpenBuild> =>
  request(openBuildSchema, 'GET', path(buildId), { signal })

/** Refused with code `conflict`; the refusal's `body` is then a `saveConflictSchema`. */
export const saveBuild = (
  buildId: string,
  save: SaveRequest,
  options: { keepalive?: boolean } = {},
): Promise<SaveAnswer> => request(saveAnswerSchema, 'POST', path(buildId, '/revisions'), { body: save, ...options })

/** The document itself, as the file that leaves the house. */
export const exportBuild = (buildId: string): Promise<unknown> => request(z.unknown(), 'GET', path(buildId, '/export'))

export const duplicateBuild = (buildId: string): Promise<OpenBuild> =>
  request(openBuildSchema, 'POST', path(buildId, '/duplicate'))

export const archiveBuild = (buildId: string): Promise<BuildSummary> =>
  request(buildSummarySchema, 'POST', path(buildId, '/archive'))

export const restoreBuild = (buildId: string): Promise<BuildSummary> =>
  request(buildSummarySchema, 'POST', path(buildId, '/restore'))
