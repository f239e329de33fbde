/** Address of the cluster's `postgres` database, and the way to stop it and delete its files. */
export function startThrowawayCluster(): Promise<{ url: string; remove: () => Promise<void> }>
