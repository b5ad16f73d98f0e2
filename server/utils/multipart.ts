import type { H3Event } from 'h3'
import { getRequestHeader } from 'h3'
import { DomainError } from '#shared/errors'
import { BODY_LIMIT, readLimitedBody } from '#server/utils/body'

/** A file as it came. */
export interface UploadedFile { name: string, content: Uint8Array }

/** Files and text fields of a form by name. */
export interface UploadedForm {
  files: Partial<Record<string, UploadedFile>>
  fields: Partial<Record<string, string>>
}

/**
 * Reads a form upload; the bytes are counted as they come and the platform's own parser takes the form apart.
 *
 * @param event the request
 * @param limitBytes largest body, the form's own lines included
 * @throws DomainError `invalid` when the body is no form or holds a name twice
 */
export async function readUpload(event: H3Event, limitBytes: number = BODY_LIMIT.upload): Promise<UploadedForm> {
  const contentType = getRequestHeader(event, 'content-type') ?? ''
  if (!contentType.startsWith('multipart/form-data')) {
    throw new DomainError('invalid', 'Send the file as a form upload (content type multipart/form-data).', ['file'])
  }
  const body = await readLimitedBody(event, limitBytes)
  const form = await parseForm(body, contentType)
  const upload: UploadedForm = { files: {}, fields: {} }
  for (const [name, value] of form) {
    if (name in upload.files || name in upload.fields) throw new DomainError('invalid', 'Send one file at a time.', [name])
    if (typeof value === 'string') upload.fields[name] = value
    else upload.files[name] = { name: value.name, content: new Uint8Array(await value.arrayBuffer()) }
  }
  return upload
}

async function parseForm(body: Buffer, contentType: string): Promise<FormData> {
  try {
    return await new Response(new Uint8Array(body.buffer as ArrayBuffer, body.byteOffset, body.byteLength), { headers: { 'content-type': contentType } }).formData()
  }
  catch {
    throw new DomainError('invalid', 'The upload was cut off or is not a valid form. Choose the file again and upload it once more.', ['file'])
  }
}
