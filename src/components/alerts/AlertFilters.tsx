import { ALERT_VIEWS, type AlertQuery } from '../../contracts/alerts.ts';
import { ALERT_KINDS, SEVERITIES } from '../../core/alerts/alert.ts';
import { alertKindText } from '../marks/AlertMark.tsx';
import { FilterSelect, Segments } from '../ui/Filters.tsx';
import { withChange } from './alertView.ts';

export interface SectorChoice {
  readonly code: string;
  readonly label: string;
}

interface AlertFiltersProps {
  readonly query: AlertQuery;
  readonly sectors: readonly SectorChoice[];
  readonly ownsBorrowers: boolean;
  readonly onChange: (query: AlertQuery) => void;
}

const ANY = { value: '', label: 'any' };
const VIEW_NAMES = { mine: 'My borrowers', 'not-taken': 'Not taken yet', desk: 'My desk' } as const;

/** The filter line: which alerts, of what kind, how thin, due when. */
export function AlertFilters({ query, sectors, ownsBorrowers, onChange }: AlertFiltersProps) {
  const change = (part: Partial<AlertQuery>) => onChange(withChange(query, part));
  const views = ALERT_VIEWS.filter((view) => view !== 'mine' || ownsBorrowers);
  return (
    <div className="filter-line">
      <Segments
        label="Whose alerts"
        value={query.view}
        segments={views.map((view) => ({ value: view, label: VIEW_NAMES[view] }))}
        onChange={(view) => change({ view: view as AlertQuery['view'] })}
      />
      <FilterSelect
        label="Kind"
        value={query.kind ?? ''}
        options={[ANY, ...ALERT_KINDS.map((kind) => ({ value: kind, label: alertKindText(kind) }))]}
        onChange={(kind) => change({ kind: kind === '' ? undefined : (kind as AlertQuery['kind']) })}
      />
      <FilterSelect
        label="Severity"
        value={query.severity ?? ''}
        options={[ANY, ...SEVERITIES.map((severity) => ({ value: severity, label: severity }))]}
        onChange={(severity) =>
          change({ severity: severity === '' ? undefined : (severity as AlertQuery['severity']) })
        }
      />
      <FilterSelect
        label="Earnings may fall"
        value={query.mayFallBelow === undefined ? '' : String(query.mayFallBelow)}
        options={[
          ANY,
          { value: '0', label: 'not met' },
          { value: '5', label: 'less than 5\u00a0%' },
          { value: '10', label: 'less than 10\u00a0%' },
          { value: '20', label: 'less than 20\u00a0%' },
        ]}
        onChange={(below) => change({ mayFallBelow: below === '' ? undefined : Number(below) })}
      />
      <FilterSelect
        label="Sector"
        value={query.sector ?? ''}
        options={[ANY, ...sectors.map((sector) => ({ value: sector.code, label: sector.label }))]}
        onChange={(sector) => change({ sector: sector === '' ? undefined : sector })}
      />
      <FilterSelect
        label="Due"
        value={query.dueWithinDays === undefined ? '' : String(query.dueWithinDays)}
        options={[
          ANY,
          { value: '0', label: 'today or overdue' },
          { value: '5', label: 'within 5 days' },
          { value: '10', label: 'within 10 days' },
        ]}
        onChange={(days) => change({ dueWithinDays: days === '' ? undefined : Number(days) })}
      />
      <FilterSelect
        label="State"
        value={query.state}
        anyValue="open"
        options={[
          { value: 'open', label: 'open' },
          { value: 'put off', label: 'put off' },
          { value: 'waiting for borrower', label: 'waiting for borrower' },
          { value: 'waiting for analyst', label: 'waiting for analyst' },
          { value: 'closing to be confirmed', label: 'closing to be confirmed' },
          { value: 'closed', label: 'closed' },
        ]}
        onChange={(state) => change({ state: state as AlertQuery['state'] })}
      />
    </div>
  );
}
