/** Largest file that is read or stored: 64 MB of 1024² bytes. */
export const MAX_FILE_BYTES = 64 * 1024 * 1024

/** Fewest usable rows of a run; below it no fit is offered. */
export const MIN_ROW_COUNT = 20

/** Share of rows that may hold something other than a number before the file is refused. */
export const MAX_BAD_ROW_SHARE = 0.2

/** Columns past this one are not looked at. */
export const MAX_COLUMN_COUNT = 500
