import type { ImportView } from '../../contracts/imports.ts';
import type { CellRef, ReadCheck } from '../../contracts/reading.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoneyInFull } from '../../core/money/print.ts';
import { classes } from '../ui/classes.ts';
import { Panel } from '../ui/Panel.tsx';

interface ChecksProps {
  readonly view: ImportView;
  readonly onShow: (at: CellRef) => void;
}

const MARKS = { ties: '✓', warning: '≈', 'does-not-tie': '◆' } as const;
const WORDS = { ties: 'ties', warning: 'small difference', 'does-not-tie': 'does not tie' } as const;

/** Identities of the accounts with their differences in whole units, and remarks that hinder nothing. */
export function Checks({ view, onShow }: ChecksProps) {
  const { checks, notes } = view.reading;
  const tying = checks.filter((check) => check.outcome === 'ties');
  return (
    <Panel title="Checks">
      {checks.length === 0 && (
        <p className="type-second">Nothing could be checked: no two lines that must agree.</p>
      )}
      <CheckList checks={checks.filter((check) => check.outcome !== 'ties')} />
      {tying.length > 0 && (
        <details>
          <summary className="cursor-pointer py-2">
            <span aria-hidden="true">✓ </span>
            {tying.length === 1 ? 'One check ties' : `${tying.length} checks tie`}
          </summary>
          <CheckList checks={tying} />
        </details>
      )}
      {notes.length > 0 && (
        <>
          <h3 className="type-heading mt-4">Remarks</h3>
          <ul className="list-disc pl-5">
            {notes.map((note) => (
              <li key={`${note.code} ${note.text}`}>
                {note.text} {note.where && <CellButton at={note.where} onShow={onShow} />}
              </li>
            ))}
          </ul>
        </>
      )}
    </Panel>
  );
}

function CheckList({ checks }: { readonly checks: readonly ReadCheck[] }) {
  return (
    <ul className="checks">
      {checks.map((check) => (
        <li
          key={`${check.code} ${check.periodEnd} ${check.months}`}
          className={classes(check.outcome === 'does-not-tie' && 'figure-magenta')}
        >
          <span aria-hidden="true">{MARKS[check.outcome]}</span>
          <span>
            {check.text}
            <span className="type-second type-small block">
              {check.months === 0 ? 'at' : `${check.months} months to`} {dayText(check.periodEnd)},{' '}
              {WORDS[check.outcome]}
            </span>
          </span>
          <span className="type-name">{formatMoneyInFull(decimal(check.difference))}</span>
        </li>
      ))}
    </ul>
  );
}

function CellButton({ at, onShow }: { readonly at: CellRef; readonly onShow: (at: CellRef) => void }) {
  return (
    <button type="button" className="link-button" onClick={() => onShow(at)}>
      {at.sheet}!{at.cell}
    </button>
  );
}
