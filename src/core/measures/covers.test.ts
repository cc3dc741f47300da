import { describe, expect, test } from 'vitest';
import { debtServiceCover } from './debtServiceCover.ts';
import { fixedChargeCover } from './fixedChargeCover.ts';
import { interestCover } from './interestCover.ts';
import { bridgeOf, requestOf, sheetOf, sidesOf, textOf, yearOf } from './request.fixture.ts';

describe('interest cover', () => {
  // cov-041: EBITDA of 12 over 4 of interest paid.
  test('is EBITDA over cash interest paid', () => {
    expect(sidesOf(interestCover.measure(requestOf([yearOf({ interest_paid: -4 })])))).toEqual(['12', '4']);
  });
});

describe('debt service cover', () => {
  // cov-046: 12 - 1.5 - 1.0 - 0.5 over 3.0 + 4.5.
  const flows = {
    tax_paid: '-1.5',
    capex: '-0.7',
    capitalised_costs_paid: '-0.3',
    interest_paid: -3,
    scheduled_principal: '4.5',
  } as const;
  const sheets = [
    sheetOf({
      current_assets: '20.5',
      cash: 4,
      current_liabilities: 12,
      short_term_debt: 2,
      tax_payable: 1,
    }),
    sheetOf(
      { current_assets: 19, cash: 3, current_liabilities: 14, short_term_debt: 4, tax_payable: 1 },
      '2024-12-31',
    ),
  ];

  test('is cash after tax, capital expenditure and working capital over interest and principal', () => {
    const measured = debtServiceCover.measure(requestOf([yearOf(flows), ...sheets]));
    expect(sidesOf(measured)).toEqual(['9', '7.5']);
    expect(textOf(measured.earnings)).toBe('12');
    expect(bridgeOf(measured)).toEqual(
      expect.arrayContaining([
        'Tax paid -1.5',
        'Capital expenditure, none of it counted as financed -1',
        'Increase in working capital -0.5',
        'Cash for debt service 9',
        'Debt service 7.5',
      ]),
    );
  });

  test('counts opening cash only where the agreement does', () => {
    const definition = { openingCashInDebtService: true };
    expect(sidesOf(debtServiceCover.measure(requestOf([yearOf(flows), ...sheets], { definition })))[0]).toBe(
      '12',
    );
  });

  test('leaves a change of tax payable out, since cash tax stands on its own', () => {
    const [now, before] = sheets;
    if (!now || !before) throw new Error('two balance sheets expected');
    const moreTax = sheetOf({
      current_assets: '20.5',
      cash: 4,
      current_liabilities: 15,
      short_term_debt: 2,
      tax_payable: 4,
    });
    expect(sidesOf(debtServiceCover.measure(requestOf([yearOf(flows), moreTax, before])))[0]).toBe('9');
  });

  test('takes working capital by its parts where totals are not given', () => {
    const parts = (receivables: string, date?: '2024-12-31') =>
      sheetOf({ receivables, inventory: 3, payables: 4 }, date);
    const measured = debtServiceCover.measure(
      requestOf([yearOf(flows), parts('8.5'), parts('8', '2024-12-31')]),
    );
    expect(sidesOf(measured)[0]).toBe('9');
  });

  test('is missing where tax, principal or a year-old balance sheet is not there', () => {
    const withoutTax = { ...flows, tax_paid: undefined };
    expect(sidesOf(debtServiceCover.measure(requestOf([yearOf(withoutTax), ...sheets])))[0]).toBe(
      'missing tax_paid',
    );
    const withoutPrincipal = { ...flows, scheduled_principal: undefined };
    expect(sidesOf(debtServiceCover.measure(requestOf([yearOf(withoutPrincipal), ...sheets])))[1]).toBe(
      'missing scheduled_principal',
    );
    expect(sidesOf(debtServiceCover.measure(requestOf([yearOf(flows), ...sheets.slice(0, 1)])))[0]).toContain(
      'missing statement',
    );
  });
});

describe('fixed-charge cover', () => {
  // cov-048: 12 + 2 - 3 - 1.5 over 2.5 + 3 + 2.
  const flows = {
    rent_expense: 2,
    capex: -3,
    tax_paid: '-1.5',
    interest_paid: '-2.5',
    scheduled_principal: 3,
    dividends_paid: -1,
  } as const;

  test('is EBITDA before rent less capital expenditure and tax over interest, principal and rent', () => {
    expect(sidesOf(fixedChargeCover.measure(requestOf([yearOf(flows)])))).toEqual(['9.5', '7.5']);
  });

  test('counts dividends as a charge where the agreement does', () => {
    const definition = { dividendsInFixedCharges: true };
    expect(sidesOf(fixedChargeCover.measure(requestOf([yearOf(flows)], { definition })))).toEqual([
      '9.5',
      '8.5',
    ]);
  });

  // Own arithmetic: frozen rules take 2 of lease rent from EBITDA, which is added back and charged as rent.
  test('by the rules at signing charges the rent of leases too', () => {
    const definition = { accounting: 'frozen' } as const;
    expect(
      sidesOf(fixedChargeCover.measure(requestOf([yearOf({ ...flows, rent_paid: -2 })], { definition }))),
    ).toEqual(['9.5', '9.5']);
  });
});

// Own arithmetic: half a year's figures, both sides twice as much a year.
test('covers of the first tests are annualised on both sides', () => {
  const half = { ...yearOf({ interest_paid: -2 }), months: 6 };
  const measured = interestCover.measure(requestOf([half], { months: 6 }));
  expect(sidesOf(measured)).toEqual(['24', '4']);
  expect(measured.remarks).toEqual(['annualised from 6 months']);
});

// Own arithmetic: (12 - 1.5 - 1 - 0.5) of half a year is 18 a year; the 3 that lay in cash stay 3.
test('opening cash of the first tests is what lay there, not twice as much', () => {
  const half = {
    ...yearOf({ interest_paid: -2, tax_paid: '-1.5', capex: -1, scheduled_principal: 3 }),
    months: 6,
  };
  const sheets = [
    sheetOf({ current_assets: '19.5', cash: 3, current_liabilities: 10 }),
    sheetOf({ current_assets: 19, cash: 3, current_liabilities: 10 }, '2025-06-30'),
  ];
  const definition = { openingCashInDebtService: true };
  const measured = debtServiceCover.measure(requestOf([half, ...sheets], { months: 6, definition }));
  expect(sidesOf(measured)).toEqual(['21', '10']);
  expect(bridgeOf(measured)).toEqual(
    expect.arrayContaining([
      'Cash for debt service, annualised 18',
      'Opening cash 3',
      'Cash for debt service with what lay there 21',
    ]),
  );
});
