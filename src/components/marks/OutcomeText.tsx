import { isNotMet, type Outcome } from '../../core/covenants/covenantTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatShare } from '../../core/money/print.ts';
import { classes } from '../ui/classes.ts';

interface OutcomeTextProps {
  readonly outcome: Outcome;
  readonly justPassing?: boolean;
  /** Why it cannot be tested, or why the ratio has no meaning. */
  readonly reason?: string | null;
}

/** The outcome in its word, with the strip's mark; the warning colour for not met and just passing alone. */
export function OutcomeText({ outcome, justPassing = false, reason }: OutcomeTextProps) {
  return (
    <span>
      <span className={classes('whitespace-nowrap', isWarned(outcome, justPassing) && 'figure-magenta')}>
        <OutcomeMark outcome={outcome} justPassing={justPassing} /> {outcome}
        {justPassing && ', just passing'}
      </span>
      {reason && <span className="type-second type-small block">{reason}</span>}
    </span>
  );
}

interface HeadroomTextProps {
  /** Share by which earnings (or the tested amount) may fall, as decimal text. */
  readonly mayFall: string | null;
  readonly outcome: Outcome;
  readonly justPassing?: boolean;
}

/** What earnings may fall, as a share. Without meaning there is no number, and the outcome says why. */
export function HeadroomText({ mayFall, outcome, justPassing = false }: HeadroomTextProps) {
  if (mayFall === null)
    return (
      <span className="type-second">
        <span aria-hidden="true">–</span>
        <span className="sr-only">no headroom figure: {outcome}</span>
      </span>
    );
  return (
    <span
      className={classes('type-name whitespace-nowrap', isWarned(outcome, justPassing) && 'figure-magenta')}
    >
      {formatShare(decimal(mayFall))}
    </span>
  );
}

const isWarned = (outcome: Outcome, justPassing: boolean): boolean =>
  justPassing || (isNotMet(outcome) && outcome !== 'not met, waived');

function OutcomeMark({ outcome, justPassing }: { readonly outcome: Outcome; readonly justPassing: boolean }) {
  return (
    <svg className="mark outcome-mark" width="10" height="10" viewBox="0 0 10 10" aria-hidden="true">
      {drawing(outcome, justPassing)}
    </svg>
  );
}

function drawing(outcome: Outcome, justPassing: boolean) {
  const line = { className: 'mark-line', strokeWidth: 1.25 } as const;
  if (justPassing) return <circle className="mark-fill" cx="5" cy="5" r="4" />;
  switch (outcome) {
    case 'met':
    case 'met, net cash':
    case 'met, no charge to cover':
      return <circle {...line} cx="5" cy="5" r="3.5" />;
    case 'met, thin':
      return (
        <>
          <circle {...line} cx="5" cy="5" r="3.5" />
          <path className="mark-fill" d="M1.5 5h7a3.5 3.5 0 0 1-7 0z" />
        </>
      );
    case 'not met':
    case 'not met, ratio has no meaning':
    case 'not met, in cure period':
      return <path className="mark-fill" d="M5 .5L9.5 5 5 9.5.5 5z" />;
    case 'not met, waived':
    case 'cured':
      return <path {...line} d="M5 1.2L8.8 5 5 8.8 1.2 5z" />;
    case 'above our trigger':
    case 'below our trigger':
      return <path {...line} d="M1.75 1.75h6.5v6.5h-6.5z" />;
    case 'cannot be tested':
      return <path {...line} d="M1.5 1.5l7 7m0-7l-7 7" />;
    case 'not tested':
    case 'awaiting figures':
      return <path {...line} d="M1.5 5h7" strokeDasharray="1.5 1.5" />;
  }
}
