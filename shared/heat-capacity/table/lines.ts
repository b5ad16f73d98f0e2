import { DomainError } from '#shared/errors'
import { refuseKnownFormat } from '#shared/heat-capacity/decode-table'

const LINE_FEED = 10
const CARRIAGE_RETURN = 13

/** Largest file, bytes, and longest line, characters, that are read. */
export const MOST_TABLE_BYTES = 50 * 1024 * 1024
const MOST_LINE_CHARACTERS = 100_000

/** Cuts a file that comes in pieces into whole lines. */
export interface LineCutter {
  /** Takes the next piece; text or bytes, not both. */
  push: (chunk: string | Uint8Array) => void
  /** Ends the file: what is left is the last line. */
  finish: () => void
  /** Bytes (or characters, when text was pushed) seen so far. */
  readonly seen: number
}

/**
 * Makes a line cutter. Bytes are UTF-8, UTF-16 with a mark, else Windows-1252; only whole lines are decoded, so a letter of several
 * bytes is never cut. Lines end with LF, CRLF or, in old files, CR.
 *
 * @param takeLine called with each line, without its end
 * @returns the cutter; its `push` throws a DomainError for a file that is too large or no text
 */
export function createLineCutter(takeLine: (line: string) => void): LineCutter {
  let seen = 0
  let text = ''
  let carried = new Uint8Array(0)
  let wide: TextDecoder | undefined
  let lineEnd: '\n' | '\r' | undefined

  function takeText(piece: string, last: boolean): void {
    text = text === '' ? piece : text + piece
    // A CR at the very end of a piece may be half of a CRLF: wait for the next.
    lineEnd ??= text.includes('\n') ? '\n' : last || /\r[^\n]/.test(text.slice(0, 65_536)) ? '\r' : undefined
    let from = 0
    if (lineEnd) {
      for (let at = text.indexOf(lineEnd); at >= 0; at = text.indexOf(lineEnd, from)) {
        const end = at > from && text.charCodeAt(at - 1) === CARRIAGE_RETURN ? at - 1 : at
        takeLine(text.slice(from, end))
        from = at + 1
      }
    }
    text = text.slice(from)
    if (text.length > MOST_LINE_CHARACTERS) throw new DomainError('invalid', `A line is longer than ${MOST_LINE_CHARACTERS} characters, so this is no table of numbers. Export it as CSV with one point a line.`, ['file'])
    if (last && text !== '') takeLine(text.endsWith('\r') ? text.slice(0, -1) : text)
  }

  function takeBytes(bytes: Uint8Array, last: boolean): void {
    if (seen === 0) {
      refuseKnownFormat(bytes)
      if (bytes[0] === 0xff && bytes[1] === 0xfe) wide = new TextDecoder('utf-16le')
      if (bytes[0] === 0xfe && bytes[1] === 0xff) wide = new TextDecoder('utf-16be')
    }
    if (wide) {
      takeText(wide.decode(bytes, { stream: !last }), last)
      return
    }
    if (bytes.includes(0)) throw new DomainError('invalid', 'This is a binary file, not a text table. Export the numbers as CSV and upload that.', ['file'])
    const whole = carried.length === 0 ? bytes : joined(carried, bytes)
    const end = last ? whole.length : Math.max(whole.lastIndexOf(LINE_FEED), whole.lastIndexOf(CARRIAGE_RETURN)) + 1
    carried = whole.slice(end)
    if (carried.length > 4 * MOST_LINE_CHARACTERS) throw new DomainError('invalid', `A line is longer than ${MOST_LINE_CHARACTERS} characters, so this is no table of numbers. Export it as CSV with one point a line.`, ['file'])
    takeText(decodeLines(whole.subarray(0, end)), last)
  }

  return {
    get seen() {
      return seen
    },
    push(chunk) {
      if (seen + chunk.length > MOST_TABLE_BYTES) throw new DomainError('invalid', `The file is larger than ${MOST_TABLE_BYTES / 1024 / 1024} MB. Cut it into parts and upload those.`, ['file'])
      if (typeof chunk === 'string') takeText(seen === 0 ? chunk.replace(/^\uFEFF/, '') : chunk, false)
      else takeBytes(chunk, false)
      seen += chunk.length
    },
    finish() {
      if (carried.length > 0) takeBytes(new Uint8Array(0), true)
      else takeText(wide ? wide.decode() : '', true)
    },
  }
}

function joined(first: Uint8Array, second: Uint8Array): Uint8Array<ArrayBuffer> {
  const whole = new Uint8Array(first.length + second.length)
  whole.set(first)
  whole.set(second, first.length)
  return whole
}

function decodeLines(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  }
  catch {
    return new TextDecoder('windows-1252').decode(bytes)
  }
}
