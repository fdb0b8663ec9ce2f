import { foundDrivesSchema, type FoundDrives } from '#shared/contract/drives.ts'
import { request } from './client.ts'

export const findDrives = (search: string, signal?: AbortSignal): Promise<FoundDrives> =>
  request(foundDrivesSchema, 'GET', '/api/drives', { query: { search }, signal })
