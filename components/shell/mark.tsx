/** The mark: one turn of a swing inside the circle of the worm. */
export function Mark({ className }: { className?: string }) {
  return (
    <svg viewBox="0 0 32 32" aria-hidden="true" className={className}>
      <circle cx="16" cy="16" r="14.8" fill="none" stroke="currentColor" strokeWidth="1.8" />
      <path
        d="M6 16c3.2-9 7-9 10 0s6.8 9 10 0"
        fill="none"
        stroke="var(--brass-fill)"
        strokeWidth="2.6"
        strokeLinecap="round"
      />
    </svg>
  )
}
