export function isReadableAddress(url?: string): boolean
