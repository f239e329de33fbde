import { predictedOrders } from '@/lib/analysis/gear-train'
import type { DriveTrain } from '@/lib/analysis/types'
import { formatPeriod, formatSignificant } from '@/lib/units'

/** What the drive train predicts: each part's swings per turn of the worm and its period. Integer orders repeat each turn. */
export function PredictedOrdersTable({ driveTrain }: { driveTrain: DriveTrain }) {
  const parts = predictedOrders(driveTrain)
  return (
    <div aria-live="polite">
      <h3 className="text-sm font-semibold text-soft">What that predicts</h3>
      {parts.length === 0 ? (
        <p className="mt-2 text-sm text-soft">Type the teeth of the wheel to see periods.</p>
      ) : (
        <table className="mt-1 w-full text-sm">
          <thead>
            <tr className="border-b border-rule text-soft">
              <th scope="col" className="py-1.5 text-left font-medium">
                part
              </th>
              <th scope="col" className="py-1.5 pl-2 text-right font-medium">
                order
              </th>
              <th scope="col" className="py-1.5 pl-2 text-right font-medium">
                period
              </th>
            </tr>
          </thead>
          <tbody>
            {parts.map(({ name, order, periodSeconds }, index) => (
              <tr key={index} className="border-b border-rule align-baseline">
                <th scope="row" className="py-1.5 text-left font-normal">
                  {name}
                </th>
                <td className="figures py-1.5 pl-2 text-right">{formatOrder(order)}</td>
                <td className="figures py-1.5 pl-2 text-right whitespace-nowrap">{formatPeriod(periodSeconds)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
      <p className="mt-2 text-sm text-soft">
        Order counts swings per turn of the worm. Only whole orders repeat from turn to turn, so only those can go into
        a correction table.
      </p>
    </div>
  )
}

function formatOrder(order: number): string {
  return Number.isInteger(order) ? String(order) : formatSignificant(order, 4)
}
