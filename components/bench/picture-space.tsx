/** Keeps the room of a picture that can't be drawn yet, and says why. */
export function PictureSpace({ heightPx, children }: { heightPx: number; children: string }) {
  return (
    <p
      className="flex items-center justify-center rounded-control bg-faint px-4 text-center text-sm text-soft"
      style={{ minHeight: heightPx }}
    >
      {children}
    </p>
  )
}

export const NO_VIEWS = 'The figures are those that were saved. The picture is drawn once the samples are here.'
