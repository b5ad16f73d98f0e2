import { and, desc, eq, ne, sql } from 'drizzle-orm'
import type { Actor } from '#shared/access/rules'
import { DomainError } from '#shared/errors'
import { createTableReader, type Table } from '#shared/heat-capacity/read-table'
import type { DatasetMapping, TablePreview } from '#shared/types/results'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'
import { datasets, runs } from '#server/db/schema'
import { readRawFile } from './raw-file'
import { datasetFor } from './run-of'

const PREVIEW_BYTES = 262_144

/**
 * Reads the beginning of a table: enough to choose its columns by, however long it is.
 *
 * @param content the file as it came
 * @throws DomainError when it is no table
 */
export function readTableStart(content: Uint8Array): Table {
  const reader = createTableReader()
  const isWhole = content.byteLength <= PREVIEW_BYTES
  const lastLineEnd = isWhole ? content.byteLength : content.subarray(0, PREVIEW_BYTES).lastIndexOf(10) + 1
  reader.push(content.subarray(0, lastLineEnd || PREVIEW_BYTES))
  const table = reader.finish()
  if (table.columns.length < 2 || table.rowCount === 0) {
    throw new DomainError('invalid', 'This is no table: no rows with two or more numbers were found. Choose the file with temperatures and heat capacities in columns.', ['file'])
  }
  return table
}

/**
 * The heads and first rows of an uploaded table, with the columns that its heads suggest and those that were chosen last
 * time for a table of the same group with the same heads.
 *
 * @param db database
 * @param files where the bytes are kept
 * @param request which dataset and who asks
 */
export async function previewTable(db: Database, files: FileStore, request: { datasetId: string, actor: Actor }): Promise<TablePreview> {
  const { run } = await datasetFor(db, request.datasetId, request.actor, 'dataset:read')
  const { content } = await readRawFile(db, files, request)
  const table = readTableStart(content)
  const sameHeads = sql`${datasets.mapping} -> 'heads' = ${JSON.stringify(table.heads)}::jsonb`
  const [last] = await db.select({ mapping: sql<DatasetMapping>`${datasets.mapping} - 'rowNumbers'`, originalName: datasets.originalName })
    .from(datasets).innerJoin(runs, eq(runs.id, datasets.runId))
    .where(and(eq(runs.groupId, run.groupId), ne(datasets.id, request.datasetId), sameHeads)).orderBy(desc(datasets.createdAt), desc(datasets.id)).limit(1)
  return {
    heads: [...table.heads],
    suggested: table.suggestedMapping,
    remembered: last ? { columns: last.mapping.columns, from: last.originalName } : null,
    delimiter: table.dialect.delimiter,
    decimal: table.dialect.decimal,
    rows: table.preview.slice(0, 8).map(({ row, cells }) => ({ row, cells: [...cells] })),
  }
}
