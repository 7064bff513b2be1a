/** Passwords by name: PG_ADMIN_PASSWORD, PG_OWNER_PASSWORD, PG_APP_PASSWORD, PG_WORK_PASSWORD. */
export type Passwords = Record<string, string>
export function readPasswords(envFile: string): Passwords
export function rolesScript(passwords: Passwords, databaseName: string): string
export function addresses(
  passwords: Passwords,
  databaseName: string,
  port: number,
): { port: number; adminUrl: string; ownerUrl: string; appUrl: string; workUrl: string }
