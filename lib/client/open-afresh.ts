/**
 * Opens a page as a whole document. After signing in or out nothing that was fetched as somebody else may stay in memory,
 * which a move within the application would keep.
 */
export function openAfresh(path: string): void {
  window.location.assign(path)
}
