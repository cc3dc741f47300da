import { useState, type DragEvent } from 'react';
import { UPLOAD_MOST_BYTES } from '../../contracts/imports.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState } from '../ui/ErrorState.tsx';
import { FieldFrame, Select } from '../ui/Field.tsx';
import { Panel } from '../ui/Panel.tsx';
import { useSending } from '../ui/useSending.ts';

export interface BorrowerChoice {
  readonly id: number;
  readonly name: string;
}

interface UploadPanelProps {
  readonly borrowers: readonly BorrowerChoice[];
  readonly borrowerId: number | null;
}

interface Faults {
  readonly borrower?: string | undefined;
  readonly file?: string | undefined;
}

/** Said before it is sent: the server would refuse it all the same. */
const tooLarge = ({ name, size }: File): string | undefined =>
  size > UPLOAD_MOST_BYTES
    ? `${name} is larger than ${UPLOAD_MOST_BYTES / 1024 / 1024} MB. Nothing was sent. Save a copy without pictures.`
    : undefined;

/** One workbook for one borrower. Whose it is, is said by the analyst: never guessed from the file. */
export function UploadPanel({ borrowers, borrowerId }: UploadPanelProps) {
  const [borrower, setBorrower] = useState(borrowerId === null ? '' : String(borrowerId));
  const [file, setFile] = useState<File | null>(null);
  const [faults, setFaults] = useState<Faults>({});
  const [dropped, setDropped] = useState(false);
  const sending = useSending<{ id: number }>();
  const choose = (chosen: File | null | undefined) => {
    sending.clear();
    setFaults(chosen ? { file: tooLarge(chosen) } : {});
    setFile(chosen ?? null);
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setDropped(true);
    choose(event.dataTransfer.files[0]);
  };
  const upload = async () => {
    const found: Faults = {
      borrower: borrower === '' ? 'Choose whose figures these are.' : undefined,
      file: file ? tooLarge(file) : 'Choose a file.',
    };
    setFaults(found);
    if (!file || found.borrower !== undefined || found.file !== undefined) return;
    const form = new FormData();
    form.set('borrowerId', borrower);
    form.set('file', file);
    const staged = await sending.submit('POST', '/imports', { body: form });
    if (staged) location.assign(`/imports/${staged.id}`);
  };
  return (
    <Panel title="Import figures">
      <form
        className="grid gap-4"
        onDragOver={(event) => event.preventDefault()}
        onDrop={drop}
        onSubmit={(event) => {
          event.preventDefault();
          void upload();
        }}
      >
        <Select
          label="Borrower"
          placeholder="Choose a borrower"
          value={borrower}
          error={faults.borrower}
          options={borrowers.map((each) => ({ value: String(each.id), label: each.name }))}
          onChange={(event) => setBorrower(event.target.value)}
        />
        <FieldFrame
          label="Workbook"
          hint="An .xlsx with income statement, balance sheet and cash flow; or drop it here"
          error={faults.file}
        >
          {(wired) => (
            <input
              {...wired}
              type="file"
              className="input"
              accept=".xlsx,.xlsm,.csv,application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"
              onChange={(event) => {
                setDropped(false);
                choose(event.target.files?.[0]);
              }}
            />
          )}
        </FieldFrame>
        {file && dropped && <p>{file.name}</p>}
        {sending.problem && <ErrorState problem={sending.problem} />}
        <Button type="submit" look="primary" busy={sending.busy} busyLabel="Reading the file…">
          Read the file
        </Button>
        <p className="type-second">The file is kept as it was sent. No figure counts until you accept.</p>
      </form>
    </Panel>
  );
}
