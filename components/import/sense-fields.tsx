import { Field, FieldGroup } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { TextInput } from '@/components/ui/text-input'
import type { ImportDraft } from './import-draft'
import type { ImportFieldFaults } from './import-faults'

interface SenseFieldsProps {
  draft: ImportDraft
  onDraft: (draft: ImportDraft) => void
  faults: ImportFieldFaults
}

/** Which way is ahead, and how that is known: it decides the sign of every correction. */
export function SenseFields({ draft, onDraft, faults }: SenseFieldsProps) {
  const { conversion, facts } = draft
  return (
    <FieldGroup legend="Sense">
      <div className="grid grid-cols-2 gap-3 max-sm:grid-cols-1">
        <Field label="Growing values mean">
          {(control) => (
            <Select
              {...control}
              value={conversion.positiveMeans}
              options={[
                { value: 'ahead', label: 'axis ahead (too far west)' },
                { value: 'behind', label: 'axis behind (too far east)' },
              ]}
              onChange={(event) =>
                onDraft({
                  ...draft,
                  conversion: { ...conversion, positiveMeans: event.target.value === 'behind' ? 'behind' : 'ahead' },
                })
              }
            />
          )}
        </Field>
        <Field label="This is">
          {(control) => (
            <Select
              {...control}
              value={conversion.senseBasis}
              options={[
                { value: 'assumed', label: 'assumed' },
                { value: 'proven', label: 'proven' },
              ]}
              onChange={(event) =>
                onDraft({
                  ...draft,
                  conversion: { ...conversion, senseBasis: event.target.value === 'proven' ? 'proven' : 'assumed' },
                })
              }
            />
          )}
        </Field>
      </div>
      {conversion.senseBasis === 'proven' ? (
        <Field
          label="How it was proven"
          hint="For example: one deliberate guide pulse to the west moved the star east; or a stretch with the drive off."
          error={faults.senseProof}
        >
          {(control) => (
            <TextInput
              {...control}
              value={facts.senseProof ?? ''}
              maxLength={500}
              onChange={(event) => onDraft({ ...draft, facts: { ...facts, senseProof: event.target.value || null } })}
            />
          )}
        </Field>
      ) : (
        <p className="text-sm text-soft">
          The size of the swing does not depend on it, but a correction made the wrong way round doubles the error.
        </p>
      )}
    </FieldGroup>
  )
}
