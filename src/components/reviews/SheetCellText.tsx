import type { CellReference, SheetCell } from '../../contracts/reviewSheet.ts';
import { classes } from '../ui/classes.ts';
import { sourceHref } from '../borrowers/figures.ts';
import { OutcomeText } from '../marks/OutcomeText.tsx';
import { SoundingStrip } from '../marks/SoundingStrip.tsx';

/** A cell of the review sheet as the page prints it: its own words, the strip where there are tests, links to source cells. */
export function SheetCellText({ cell }: { readonly cell: SheetCell }) {
  switch (cell.kind) {
    case 'text':
      return cell.text;
    case 'absent':
      return (
        <span className={classes('type-second', cell.text.length < 16 && 'whitespace-nowrap')}>
          {cell.text}
        </span>
      );
    case 'figure':
    case 'day':
      return <span className="whitespace-nowrap">{cell.text}</span>;
    case 'outcome':
      return (
        <OutcomeText
          outcome={cell.outcome}
          justPassing={cell.justPassing}
          reason={cell.remarks.length > 0 ? cell.remarks.join('; ') : null}
        />
      );
    case 'tests':
      return <SoundingStrip tests={cell.tests} size="row" label={cell.label} />;
    case 'references':
      return <References references={cell.references} />;
  }
}

/** The file once, then the cells read from it. */
function References({ references }: { readonly references: readonly CellReference[] }) {
  const files = [...new Set(references.map(({ fileName }) => fileName))];
  return files.map((file) => (
    <span key={file} className="block">
      {file}:
      {references
        .filter(({ fileName }) => fileName === file)
        .map(({ statementId, line, reference, sign }) => (
          <span key={`${statementId} ${line} ${reference}`}>
            {sign === -1 ? ' less ' : ' '}
            <a href={sourceHref(statementId, line)}>{reference}</a>
          </span>
        ))}
    </span>
  ));
}
