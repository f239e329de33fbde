export interface Settings {
  DATABASE_URL?: string
  SMTP_URL?: string
  PORT?: string
  BASE_URL?: string
  TRUST_PROXY?: string
}

export function parseEnvironmentFile(text: string): Record<string, string>
export function settingFaults(settings: Settings): string[]
export function readSettings(root: string): Settings
