import { DomainError } from '#shared/errors'

/** First bytes of files that are often sent in place of a table, and what to do instead. */
const KNOWN_FORMATS: readonly { bytes: readonly number[], sentence: string }[] = [
  { bytes: [0x50, 0x4b, 0x03, 0x04], sentence: 'This is a spreadsheet or a packed folder. Save the sheet as CSV, or unpack the folder, and upload the table itself.' },
  { bytes: [0xd0, 0xcf, 0x11, 0xe0], sentence: 'This is a spreadsheet in a binary format. Save the sheet as CSV and upload that.' },
  { bytes: [0x1f, 0x8b], sentence: 'This file is compressed. Unpack it and upload the table itself.' },
  { bytes: [0x25, 0x50, 0x44, 0x46], sentence: 'This is a PDF, not a table. Export the numbers as CSV and upload that.' },
  { bytes: [0x89, 0x50, 0x4e, 0x47], sentence: 'This is a picture, not a table. Export the numbers as CSV and upload that.' },
  { bytes: [0xff, 0xd8, 0xff], sentence: 'This is a picture, not a table. Export the numbers as CSV and upload that.' },
  { bytes: [0x89, 0x48, 0x44, 0x46], sentence: 'This is an HDF5 file, not a text table. Export the numbers as CSV and upload that.' },
]

/**
 * Turns the bytes of an uploaded table into text: UTF-8 (with or without a mark), UTF-16 with a mark, else Windows-1252,
 * in which older instruments write µ and °.
 *
 * @param bytes the file as it came
 * @returns its text without a byte-order mark
 * @throws DomainError `invalid` when the file is empty, a known binary format, or no text at all
 */
export function decodeTable(bytes: Uint8Array): string {
  if (bytes.length === 0) throw new DomainError('invalid', 'The file is empty. Choose the file with the measured table.', ['file'])
  refuseKnownFormat(bytes)
  const text = decodeText(bytes)
  if (/^\s*$/.test(text)) throw new DomainError('invalid', 'The file holds only blank lines. Choose the file with the measured table.', ['file'])
  return text
}

/**
 * Refuses a file whose first bytes are those of a known format that is no text table.
 *
 * @param bytes the beginning of the file
 * @throws DomainError `invalid` naming the format and what to do
 */
export function refuseKnownFormat(bytes: Uint8Array): void {
  const known = KNOWN_FORMATS.find(format => format.bytes.every((byte, index) => bytes[index] === byte))
  if (known) throw new DomainError('invalid', known.sentence, ['file'])
}

function decodeText(bytes: Uint8Array): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return new TextDecoder('utf-16le').decode(bytes)
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return new TextDecoder('utf-16be').decode(bytes)
  if (bytes.includes(0)) throw new DomainError('invalid', 'This is a binary file, not a text table. Export the numbers as CSV and upload that.', ['file'])
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  }
  catch {
    return new TextDecoder('windows-1252').decode(bytes)
  }
}
