import { createColumnHelper, useTable } from '@tanstack/react-table';
import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, test } from 'vitest';
import { Button } from './Button.tsx';
import { DataGrid } from './DataGrid.tsx';
import { gridFeatures } from './dataGrid.ts';
import { ErrorState } from './ErrorState.tsx';
import { Facts } from './Facts.tsx';
import { Field, Select } from './Field.tsx';
import { FilterButton, Segments } from './Filters.tsx';
import { Pager } from './Pager.tsx';
import { RadioGroup } from './RadioGroup.tsx';
import { Caution, Progress } from './States.tsx';
import { NameCell } from './Table.tsx';

describe('a field', () => {
  test('ties its label, its hint and its error to the control', () => {
    const html = renderToStaticMarkup(
      <Field label="LEI" name="lei" hint="20 characters" error="The checksum does not fit." />,
    );
    const id = /<input[^>]* id="([^"]+)"/.exec(html)?.[1];
    expect(id).toBeTruthy();
    expect(html).toContain(`for="${id}"`);
    expect(html).toContain(`aria-describedby="${id}-hint ${id}-error"`);
    expect(html).toContain('aria-invalid="true"');
    expect(html).toContain(`id="${id}-error"`);
  });

  test('without an error is not marked invalid and describes nothing that is not there', () => {
    const html = renderToStaticMarkup(<Field label="LEI" name="lei" />);
    expect(html).not.toContain('aria-invalid');
    expect(html).not.toContain('aria-describedby');
  });

  test('offers an empty choice first where nothing may be preselected', () => {
    const html = renderToStaticMarkup(
      <Select label="Grade" placeholder="Choose" options={[{ value: 'W1', label: 'W1 (monitor)' }]} />,
    );
    expect(html.indexOf('value=""')).toBeLessThan(html.indexOf('value="W1"'));
  });

  test('radio choices stand under one legend, none preselected', () => {
    const html = renderToStaticMarkup(
      <RadioGroup
        legend="Reason"
        name="r"
        value={null}
        options={[
          { value: '1', label: 'A' },
          { value: '2', label: 'B' },
        ]}
      />,
    );
    expect(html).toContain('<legend');
    expect(html).not.toContain('checked');
  });
});

describe('a button', () => {
  test('that is busy stays in reach and says so', () => {
    const html = renderToStaticMarkup(
      <Button busy busyLabel="Taking it…">
        Take it
      </Button>,
    );
    expect(html).toContain('aria-disabled="true"');
    expect(html).toContain('Taking it…');
    expect(html).not.toMatch(/ disabled/);
  });

  test('does not send a form unless told to', () => {
    expect(renderToStaticMarkup(<Button>Take it</Button>)).toContain('type="button"');
    expect(renderToStaticMarkup(<Button type="submit">Sign in</Button>)).toContain('type="submit"');
  });
});

describe('an error', () => {
  const problem = {
    type: '/x',
    title: 'Cannot be used',
    status: 422,
    detail: 'Nothing was changed.',
    instance: 'urn:request:7f3a',
  };

  test('says what, why, where and which request', () => {
    const html = renderToStaticMarkup(
      <ErrorState
        problem={{
          ...problem,
          errors: [{ sheet: 'Balance', cell: 'B31', code: 'x', message: 'holds #REF!' }],
        }}
      />,
    );
    expect(html).toContain('role="alert"');
    expect(html).toContain('Balance!B31');
    expect(html).toContain('holds #REF!');
    expect(html).toContain('Request 7f3a');
  });

  test('of an ended session leads to sign-in in a new tab, so that what was typed stays', () => {
    const html = renderToStaticMarkup(<ErrorState problem={{ ...problem, status: 401 }} />);
    expect(html).toMatch(/<a href="\/sign-in" target="_blank"/);
  });
});

describe('pages of a list', () => {
  const pager = (page: number, total: number) =>
    renderToStaticMarkup(
      <Pager page={page} perPage={50} total={total} what="alerts" hrefOf={(to) => `?page=${to}`} />,
    );

  test('count what is shown', () => {
    expect(pager(2, 137)).toContain('51 to 100 of 137 alerts');
    expect(pager(3, 137)).toContain('101 to 137 of 137 alerts');
    expect(pager(1, 0)).toContain('No alerts');
  });

  test('lead no further than the first and the last', () => {
    expect(pager(1, 137)).not.toContain('rel="prev"');
    expect(pager(3, 137)).not.toContain('rel="next"');
    expect(pager(2, 137)).toContain('href="?page=1"');
    expect(pager(2, 137)).toContain('href="?page=3"');
  });

  test('are none where one page holds everything', () => {
    expect(pager(1, 50)).not.toContain('Page 1');
    expect(pager(1, 51)).toContain('Page 1 of 2');
  });
});

test('progress gives its count to a screen reader and draws its share', () => {
  const html = renderToStaticMarkup(<Progress label="Tested 3 of 12 borrowers" done={3} of={12} />);
  expect(html).toContain('aria-valuenow="3"');
  expect(html).toContain('aria-valuemax="12"');
  expect(html).toContain('class="bar-ink" x="0" y="0" width="100"');
});

describe('a grid', () => {
  interface Borrower {
    readonly id: number;
    readonly name: string;
    readonly exposure: string;
  }
  const helper = createColumnHelper<typeof gridFeatures, Borrower>();
  const columns = helper.columns([
    helper.accessor('name', {
      header: 'Borrower',
      enableSorting: false,
      meta: { namesRow: true, fixed: true },
      cell: (cell) => <NameCell name={cell.getValue()} href={`/borrowers/${cell.row.original.id}`} />,
    }),
    helper.accessor('exposure', { header: 'Exposure', meta: { numeric: true, entry: 'figure' } }),
  ]);
  const data: Borrower[] = [
    { id: 1, name: 'Ostrel Lane Foods', exposure: '4.6m' },
    { id: 2, name: 'Merrin Plant Hire', exposure: '9.0m' },
  ];

  function Grid({ rows }: { readonly rows: Borrower[] }) {
    const table = useTable({
      features: gridFeatures,
      columns,
      data: rows,
      manualSorting: true,
      getRowId: (row) => String(row.id),
      initialState: { sorting: [{ id: 'exposure', desc: true }] },
    });
    return <DataGrid table={table} caption="Borrowers" current="2" empty={<p>No borrower yet</p>} />;
  }
  const html = renderToStaticMarkup(<Grid rows={data} />);

  test('is a table with a caption, heads with scope, and a head for each row', () => {
    expect(html).toContain('<caption');
    expect(html.match(/<th scope="col"/g)).toHaveLength(2);
    expect(html.match(/<th scope="row"/g)).toHaveLength(2);
  });

  test('says how it is sorted, and only for columns that can be', () => {
    expect(html.match(/aria-sort/g)).toHaveLength(1);
    expect(html).toContain('aria-sort="descending"');
  });

  test('keeps the order the server gave and marks the current row', () => {
    expect(html.indexOf('Ostrel')).toBeLessThan(html.indexOf('Merrin'));
    expect(html.match(/data-current="true"/g)).toHaveLength(1);
    expect(html.indexOf('data-current')).toBeGreaterThan(html.indexOf('Ostrel'));
  });

  test('without rows says what there is to say instead', () => {
    expect(renderToStaticMarkup(<Grid rows={[]} />)).toBe('<p>No borrower yet</p>');
  });
});

test('filters and segments say what is chosen', () => {
  const html = renderToStaticMarkup(
    <>
      <Segments
        label="Whose"
        value="mine"
        segments={[
          { value: 'mine', label: 'My borrowers' },
          { value: 'desk', label: 'My desk', href: '?whose=desk' },
        ]}
      />
      <FilterButton set removes href="?">
        Due within 10 days
      </FilterButton>
    </>,
  );
  expect(html).toContain('aria-pressed="true"');
  expect(html).not.toContain('aria-current');
  expect(html).toContain('take this filter away');
});

test('nothing is styled inline', () => {
  const html = renderToStaticMarkup(
    <>
      <Progress label="x" done={1} of={3} />
      <Caution>x</Caution>
      <Facts facts={[{ label: 'a', value: 'b' }]} />
      <Field label="x" />
    </>,
  );
  expect(html).not.toMatch(/\sstyle=/);
});
