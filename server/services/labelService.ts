import { resolve } from '#shared/build/resolve.ts'
import type { LabelsRequest } from '#shared/contract/labels.ts'
import { chooseLabels } from '#shared/paper/labels/choose.ts'
import { printLabels } from '#shared/paper/labels/labelPages.ts'
import type { Label } from '#shared/paper/labels/label.ts'
import { labelsOf } from '#shared/paper/labels/spareLabels.ts'
import { paperPdf } from '../files/paperPdf.ts'
import { Build } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'

export interface LabelsPdf {
  pdf: Buffer
  buildName: string
  revision: number
}

/** Labels of one revision on sheets, as a PDF. Refused where there is nothing to print. */
export async function labelsPdf(context: Context, buildId: string, request: LabelsRequest): Promise<LabelsPdf> {
  const { index } = await context.catalog.current()
  const revision = request.revision ?? (await newestRevision(buildId))
  const labelsAt = async (number: number): Promise<Label[]> =>
    labelsOf(resolve(await readDocument(context.database, buildId, number), index))
  const { name, machine } = await readDocument(context.database, buildId, revision)
  const before = request.since === undefined ? undefined : await labelsAt(request.since)
  const { print } = chooseLabels(await labelsAt(revision), request, before)
  if (print.length === 0) throw new Refusal('bad-input', { errors: [{ path: 'groups', message: 'no label to print' }] })
  const { document } = printLabels(print, request, `Labels, ${machine ?? name}, revision ${revision}`)
  return { pdf: await paperPdf(document), buildName: name, revision }
}

async function newestRevision(buildId: string): Promise<number> {
  const build = await Build.findByPk(buildId, { attributes: ['revision'] })
  if (!build) throw new Refusal('not-found')
  return build.revision
}
