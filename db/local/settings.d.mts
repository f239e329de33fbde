export interface Settings {
  DATABASE_URL?: string
  SMTP_URL?: string
  MAIL_FROM?: string
  PORT?: string
  BASE_URL?: string
  TRUST_PROXY?: string
}

export function parseEnvironmentFile(text: string): Record<string, string>
export function settingFaults(settings: Settings): string[]
export function readSettings(root: string): Settings
export function linkOriginOf(settings: Pick<Settings, 'BASE_URL'>, port: number): string
