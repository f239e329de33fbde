import type { ColumnType, Generated } from 'kysely'
import type { Conversion } from '@/lib/analysis/types'
import type { ImportSettings } from '@/lib/formats/types'
import type { RunFacts } from '@/lib/schemas/run-facts'
import type { Json } from './projects'

type NullableJson<T> = ColumnType<T | null, string | null | undefined, string | null>

export interface RunsTable {
  id: Generated<string>
  projectId: string
  version: Generated<number>
  name: string
  fileName: string
  byteLength: number
  fileSha256: string
  /** 'ready' once the file has been read; then the nullable columns below are filled. */
  status: 'uploaded' | 'ready'
  importSettings: NullableJson<ImportSettings>
  conversion: NullableJson<Conversion>
  facts: Json<RunFacts>
  /** The start among the facts, kept by PostgreSQL itself so that lists can be sorted by it. */
  startedAt: ColumnType<Date | null, never, never>
  rowCount: number | null
  samplesSha256: string | null
  /** Who brought it in where it comes from, if not here. */
  authorName: string | null
  createdAt: Generated<Date>
  createdBy: string
  updatedAt: Generated<Date>
  updatedBy: string
}

/** The original file, byte for byte, in rows of 1 MB. */
export interface RunFileChunksTable {
  runId: string
  index: number
  bytes: Buffer
}

/** The columns as they were read: lib/formats/packed-columns.ts, compressed. */
export interface RunColumnsTable {
  runId: string
  encoding: 'gzip'
  bytes: Buffer
}
