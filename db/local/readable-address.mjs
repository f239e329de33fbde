/**
 * Whether the path of a request's address holds nothing but text. Next.js answers others, like `/%ff`, as if the server had
 * failed.
 */
export function isReadableAddress(url = '') {
  try {
    decodeURIComponent(url.split('?')[0])
    return true
  } catch {
    return false
  }
}
