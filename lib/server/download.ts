import 'server-only'

/** RFC 5987 value characters beside letters and digits. */
function encodeFileName(name: string): string {
  return encodeURIComponent(name).replace(/['()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`)
}

/** Headers of an answer that a browser saves rather than shows (RFC 6266: a plain name and the full one). */
export function attachment({ fileName, contentType }: { fileName: string; contentType: string }): Headers {
  const plainName = fileName.replace(/[^\x20-\x7e]|["\\%/]/g, '_')
  return new Headers({
    'content-type': contentType,
    'content-disposition': `attachment; filename="${plainName}"; filename*=UTF-8''${encodeFileName(fileName)}`,
    'x-content-type-options': 'nosniff',
    'cache-control': 'private, no-store',
  })
}
