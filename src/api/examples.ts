import { z } from 'zod'
import { exampleSchema, type Example } from '#shared/contract/catalog.ts'
import { request } from './client.ts'

export const listExamples = (signal?: AbortSignal): Promise<Example[]> =>
  request(z.array(exampleSchema), 'GET', '/api/examples', { signal })
