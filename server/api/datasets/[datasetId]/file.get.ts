import { setResponseHeaders } from 'h3'
import { datasetParams } from '#shared/schemas/results'
import { readRawFile } from '#server/services/results/raw-file'
import { defineApi } from '#server/utils/define-api'
import { useFileStore } from '#server/utils/files'

/** The file byte for byte, as something to save and never to run. */
export default defineApi({ access: 'dataset:read', params: datasetParams }, async ({ event, db, actor, params }) => {
  const { content, originalName, sha256 } = await readRawFile(db, useFileStore(), { datasetId: params.datasetId, actor })
  setResponseHeaders(event, {
    'content-type': 'application/octet-stream',
    'content-length': content.byteLength,
    'content-disposition': `attachment; filename*=UTF-8''${encodeName(originalName)}`,
    'x-content-type-options': 'nosniff',
    'content-security-policy': 'sandbox; default-src \'none\'',
    'etag': `"${sha256}"`,
  })
  return content
})

/** RFC 8187: everything but its attr-char is written in per cent. */
function encodeName(name: string): string {
  return encodeURIComponent(name).replace(/['()*]/g, character => `%${character.charCodeAt(0).toString(16).toUpperCase()}`)
}
