/** Addresses of one database of the project's own PostgreSQL, one for each role. */
export type DatabaseAddresses = {
  started: boolean
  port: number
  adminUrl: string
  ownerUrl: string
  appUrl: string
  workUrl: string
}
export function startDatabase(options?: { databaseName?: string }): Promise<DatabaseAddresses>
export function stopDatabase(): Promise<void>
export function leaveDatabase(): Promise<void>
export function databaseStatus(): { running: boolean; port: number | null; dataDir: string }
export function resetDatabase(): Promise<void>
/** Folder of the newest PostgreSQL server's programs. */
export function findServer(): string
