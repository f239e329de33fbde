const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', timeZone: 'UTC' })
const minute = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  hour: '2-digit',
  minute: '2-digit',
  timeZone: 'UTC',
})
const dayAndTime = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
  timeZone: 'UTC',
})

/** 14 Nov 2026, in UTC, so that server and browser write the same. */
export function formatDay(iso: string | null): string {
  return iso === null ? '–' : day.format(new Date(iso))
}

/** 14 Nov, 21:40 UTC. */
export function formatMinute(iso: string | null): string {
  return iso === null ? '–' : `${minute.format(new Date(iso))} UTC`
}

/** 14 Nov 2026, 21:40, for a column whose head says that it is UTC. */
export function formatDayAndTime(iso: string | null): string {
  return iso === null ? '–' : dayAndTime.format(new Date(iso))
}
