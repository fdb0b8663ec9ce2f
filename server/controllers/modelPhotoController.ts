import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { putModelPhoto, readModelPhoto, removeModelPhoto } from '../services/modelPhotoService.ts'
import { userOf } from './signedIn.ts'

export async function putPhoto(call: Call<{ modelId: string }>): Promise<Answer> {
  return ok(await putModelPhoto(userOf(call).id, call.params.modelId, call.body as Buffer))
}

/** The photo as a picture and nothing else: its kind is ours, and no page can make more of it. */
export async function readPhoto(call: Call<{ modelId: string }>): Promise<Answer> {
  const { photo, version } = await readModelPhoto(userOf(call).id, call.params.modelId)
  const headers = {
    ETag: `"${version}"`,
    'Cache-Control': 'private, no-cache',
    'Content-Security-Policy': "default-src 'none'; sandbox",
  }
  if (call.request.get('if-none-match') === headers.ETag) return { status: 304, headers }
  const disposition = `inline; filename="label-${call.params.modelId}.webp"`
  return {
    status: 200,
    body: photo,
    headers: { ...headers, 'Content-Type': 'image/webp', 'Content-Disposition': disposition },
  }
}

export async function deletePhoto(call: Call<{ modelId: string }>): Promise<Answer> {
  await removeModelPhoto(userOf(call).id, call.params.modelId)
  return nothing
}
