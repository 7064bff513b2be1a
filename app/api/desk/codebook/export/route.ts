import { allowedActor } from '@/lib/auth/allowed'
import { answered } from '@/lib/sync/server/answer'
import { exportBook, exportedFile } from '@/lib/sync/server/book/export-book'
import { problemAnswer, refusing } from '@/lib/sync/server/problems'

/**
 * GET /api/desk/codebook/export: a version (`?version=`, the newest, or `draft`) as a JSON file, or with `?kind=` the
 * CSV file of one kind of record.
 */
export const GET = (request: Request) =>
  answered(async () => {
    const found = await allowedActor(request, 'book.publish')
    if (!found.ok) return problemAnswer(found.problem)
    const asked = new URL(request.url).searchParams
    const which = versionOf(asked.get('version'))
    const book = which === undefined ? undefined : await exportBook(found.value.shopId, which)
    const file = book && exportedFile(book, asked.get('kind'))
    if (!file) return problemAnswer({ kind: 'notFound' })
    const headers = {
      'content-type': file.type,
      'content-disposition': `attachment; filename="${file.name}"`,
      'cache-control': 'no-store',
    }
    return new Response(file.text, { headers })
  })

function versionOf(text: string | null): number | 'draft' | null | undefined {
  if (text === null || text === 'draft') return text
  return /^[1-9]\d{0,8}$/.test(text) ? Number(text) : undefined
}

export const { POST, PUT, PATCH, DELETE } = refusing('GET')
