import { sql, type Transaction } from 'kysely'
import type { DriveTrain } from '@/lib/analysis/types'
import type { Database } from '../schema'
import type { ProjectAccess } from './access'

/** Keeps a further version beside the old ones; the highest number is the one that holds. */
export async function insertDriveTrain(
  trx: Transaction<Database>,
  access: ProjectAccess<'edit'>,
  driveTrain: DriveTrain,
): Promise<void> {
  const { axisKind, wheelTeeth, wormStarts, stages } = driveTrain
  await trx
    .insertInto('driveTrains')
    .values({
      projectId: access.projectId,
      number: sql<number>`(select coalesce(max(number), 0) + 1 from drive_trains where project_id = ${access.projectId})`,
      axisKind,
      wheelTeeth,
      wormStarts,
      stages: JSON.stringify(stages),
      createdBy: access.userId,
    })
    .execute()
}
