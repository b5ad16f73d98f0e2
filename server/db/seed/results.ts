import type { Random } from './random'
import type { SeededRun } from './runs'
import type { SeededPeople } from './people'
import type { FileStore } from '#server/adapters/storage/files'
import type { Database } from '#server/db/client'

/** What seeding results needs. */
export interface ResultTools { files: FileStore, random: Random, people: SeededPeople, now: Date }

/** Results of past runs. */
export async function seedResults(_db: Database, _past: SeededRun[], _tools: ResultTools): Promise<void> {
  await Promise.resolve()
}
