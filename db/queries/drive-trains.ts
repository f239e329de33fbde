import { sql, type Kysely, type Transaction } from 'kysely'
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

/** Every version, newest first. */
export function listDriveTrains(db: Kysely<Database>, access: ProjectAccess) {
  return db
    .selectFrom('driveTrains')
    .innerJoin('users', 'users.id', 'driveTrains.createdBy')
    .select([
      'driveTrains.id',
      'driveTrains.number',
      'driveTrains.axisKind',
      'driveTrains.wheelTeeth',
      'driveTrains.wormStarts',
      'driveTrains.stages',
      'driveTrains.createdAt',
      'users.displayName as createdBy',
    ])
    .where('driveTrains.projectId', '=', access.projectId)
    .orderBy('driveTrains.number', 'desc')
    .execute()
}
