import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { auditQuery, type AuditCheck, type AuditQuery, type AuditRow } from '../../contracts/audit.ts';
import { isPlainDate } from '../../core/calendar/plainDate.ts';
import type { Page } from '../../contracts/paging.ts';
import { Refusal, get, getOrThrow, type Answer } from '../ui/api.ts';
import { Button } from '../ui/Button.tsx';
import { ErrorState, Notice } from '../ui/ErrorState.tsx';
import { Field } from '../ui/Field.tsx';
import { IslandQueries } from '../ui/IslandQueries.tsx';
import { Pager } from '../ui/Pager.tsx';
import { Panel } from '../ui/Panel.tsx';
import { EmptyState } from '../ui/States.tsx';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';

interface AuditSheetProps {
  readonly query: AuditQuery;
  readonly first: Page<AuditRow>;
}

/** Every change, newest first, and the check that none was altered. */
export function AuditSheet(props: AuditSheetProps) {
  return (
    <IslandQueries>
      <AuditLog {...props} />
    </IslandQueries>
  );
}

function auditSearch(query: AuditQuery): string {
  const defaults = auditQuery.parse({});
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(query) as [keyof AuditQuery, string | number | undefined][])
    if (value !== undefined && value !== '' && value !== defaults[key]) search.set(key, String(value));
  const text = search.toString();
  return text === '' ? '' : `?${text}`;
}

const dayOf = (text: string) => (isPlainDate(text) ? text : undefined);

function AuditLog({ query: firstQuery, first }: AuditSheetProps) {
  const [query, setQuery] = useState(firstQuery);
  const search = auditSearch(query);
  const log = useQuery({
    queryKey: ['audit', search],
    queryFn: ({ signal }) => getOrThrow<Page<AuditRow>>(`/audit-log${search}`, signal),
    placeholderData: keepPreviousData,
    ...(query === firstQuery && { initialData: first }),
  });
  const show = (next: AuditQuery) => {
    history.replaceState(null, '', `/audit-log${auditSearch(next)}`);
    setQuery(next);
  };
  const page = log.data;
  return (
    <>
      <div className="filter-line items-end">
        <Field
          label="From"
          type="date"
          value={query.from ?? ''}
          onChange={(event) => show({ ...query, page: 1, from: dayOf(event.target.value) })}
        />
        <Field
          label="To"
          type="date"
          value={query.to ?? ''}
          onChange={(event) => show({ ...query, page: 1, to: dayOf(event.target.value) })}
        />
        <Field
          label="What was done"
          placeholder="accept-import"
          value={query.action ?? ''}
          onChange={(event) => show({ ...query, page: 1, action: event.target.value || undefined })}
        />
        <div className="filter-end">
          <ChainCheck />
        </div>
      </div>
      {log.error instanceof Refusal && (
        <ErrorState problem={log.error.problem} onRetry={() => void log.refetch()} />
      )}
      {page && (
        <Panel flush label="Audit log">
          {page.total === 0 ? (
            <EmptyState title="No entry in this view">Take a filter away.</EmptyState>
          ) : (
            <Entries rows={page.rows} />
          )}
          {page.total > 0 && (
            <Pager
              page={page.page}
              perPage={page.perPage}
              total={page.total}
              what="entries"
              hrefOf={(to) => `/audit-log${auditSearch({ ...query, page: to })}`}
              onPage={(to) => show({ ...query, page: to })}
            />
          )}
        </Panel>
      )}
    </>
  );
}

function Entries({ rows }: { readonly rows: readonly AuditRow[] }) {
  return (
    <Table caption="Audit entries, newest first; times in UTC" entries>
      <TableHead>
        <tr role="row">
          <HeadCell numeric>No.</HeadCell>
          <HeadCell>When (UTC)</HeadCell>
          <HeadCell>Who</HeadCell>
          <HeadCell>What</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {rows.map((row) => (
          <Row key={row.seq}>
            <Cell numeric entry="mark">
              {row.seq}
            </Cell>
            <Cell nowrap entry="extra">
              {row.at.slice(0, 10)} {row.at.slice(11, 19)}
            </Cell>
            <Cell entry="strip">
              {row.who}
              <span className="type-second type-small block">{row.address}</span>
            </Cell>
            <Cell entry="main">
              {row.summary}
              <span className="type-second type-small block">
                {row.action}, {row.subject}
                {row.borrowerId !== null && (
                  <>
                    ,{' '}
                    <a href={`/borrowers/${row.borrowerId}`}>
                      {row.borrowerName ?? `borrower ${row.borrowerId}`}
                    </a>
                  </>
                )}
              </span>
              {(row.before ?? row.after) !== null && (
                <details>
                  <summary className="type-small cursor-pointer">Before and after</summary>
                  <pre className="audit-json">{`before ${row.before ?? '–'}\nafter ${row.after ?? '–'}\nrequest ${row.requestId}\nhash ${row.hash}`}</pre>
                </details>
              )}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** Recomputes the whole chain on the server and says what it came to. */
function ChainCheck() {
  const [check, setCheck] = useState<Answer<AuditCheck> | 'running' | null>(null);
  const run = async () => {
    setCheck('running');
    setCheck(await get<AuditCheck>('/audit-log/check'));
  };
  return (
    <>
      <Button busy={check === 'running'} busyLabel="Checking…" onClick={() => void run()}>
        Check the chain
      </Button>
      {check !== null && check !== 'running' && !check.ok && <ErrorState problem={check.problem} />}
      {check !== null && check !== 'running' && check.ok && (
        <Notice blocking={!check.value.intact}>
          {check.value.intact
            ? `All ${check.value.entries} entries follow from one another; head ${check.value.headHash.slice(0, 12)}.`
            : `Entry ${check.value.firstBroken ?? '?'} does not follow from the one before it. Keep the database as it is and tell the auditor.`}
        </Notice>
      )}
    </>
  );
}
