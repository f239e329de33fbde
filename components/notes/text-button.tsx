export function TextButton({
  onClick,
  children,
  label,
  id,
  isExpanded,
}: {
  onClick: () => void
  children: string
  label?: string
  id?: string
  isExpanded?: boolean
}) {
  return (
    <button
      type="button"
      id={id}
      aria-label={label}
      aria-expanded={isExpanded}
      onClick={onClick}
      className="text-soft underline decoration-rule underline-offset-2 hover:text-ink pointer-coarse:min-h-11"
    >
      {children}
    </button>
  )
}
