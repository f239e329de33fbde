export function databaseFault(error: Error & { code?: string; errors?: unknown[] }, connectionString: string): string
export function checkDatabase(connectionString: string): Promise<void>
