import { useQuery } from '@tanstack/react-query';
import { SelectField } from '#src/ui/field.tsx';
import { PaperChooser } from './paper-chooser.tsx';
import { papersQuery } from './paper-queries.ts';

/**
 * Which paper a figure was taken from, in any dialog of Money: one that is here, or a file added right there. The form around it keeps what was
 * typed. An empty value is no paper.
 */
export function PaperField({
  householdId,
  value,
  error,
  onChange,
}: {
  householdId: string;
  value: string;
  error?: string | undefined;
  onChange: (documentId: string) => void;
}) {
  const view = useQuery(papersQuery(householdId));
  const papers = view.data?.papers ?? [];
  const isListed = value === '' || papers.some(({ id }) => id === value);
  return (
    <>
      <SelectField
        label="Paper"
        hint="The statement, receipt or contract it was taken from."
        error={error}
        value={value}
        onChange={(event) => onChange(event.target.value)}
      >
        <option value="">none</option>
        {!isListed && <option value={value}>the paper chosen before</option>}
        {papers.map((paper) => (
          <option key={paper.id} value={paper.id}>
            {paper.fileName}
          </option>
        ))}
      </SelectField>
      <div className="mt-2">
        <PaperChooser householdId={householdId} label="Add a file" onAdded={onChange} />
      </div>
    </>
  );
}
