import type { SelectOption } from '@/components/ui/select'
import type { Role } from '@/lib/schemas/api'

/** From the least to the most. */
export const ROLE_OPTIONS: readonly SelectOption<Role>[] = [
  { value: 'viewer', label: 'viewer' },
  { value: 'editor', label: 'editor' },
  { value: 'owner', label: 'owner' },
]
