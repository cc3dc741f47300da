import type { CovenantView } from '../../contracts/borrowers.ts';
import type { ScenarioView, SensitivityView } from '../../contracts/outlook.ts';
import { SCENARIOS } from '../../core/outlook/sensitivity.ts';
import { limitText, testedText } from '../borrowers/figures.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { OutcomeText } from '../marks/OutcomeText.tsx';
import { Panel } from '../ui/Panel.tsx';
import { ScrollRegion } from '../ui/ScrollRegion.tsx';
import { Cell, HeadCell, NameCell, Row, Table, TableBody, TableHead } from '../ui/Table.tsx';
import { SCENARIO_NAMES, sizesText } from './outlookWords.ts';

interface ScenariosPanelProps {
  readonly covenants: readonly CovenantView[];
  readonly sensitivity: SensitivityView;
}

/** Every live test recomputed in two named scenarios, whose sizes are printed. */
export function ScenariosPanel({ covenants, sensitivity }: ScenariosPanelProps) {
  return (
    <Panel title="Two scenarios" aside={<MethodLink topic="sensitivity" />}>
      <ul className="sentences">
        {SCENARIOS.map((name) => (
          <li key={name}>
            <span className="type-name">{SCENARIO_NAMES[name]}: </span>
            {sizesText(sensitivity.sizes[name])}.
          </li>
        ))}
      </ul>
      <ScrollRegion label="Every live test in two scenarios" className="mt-3">
        <Table caption="Every live test in two scenarios">
          <TableHead>
            <tr role="row">
              <HeadCell>Covenant</HeadCell>
              <HeadCell>As tested</HeadCell>
              {SCENARIOS.map((name) => (
                <HeadCell key={name}>{SCENARIO_NAMES[name]}</HeadCell>
              ))}
            </tr>
          </TableHead>
          <TableBody>
            {sensitivity.tests.flatMap((test) => {
              const covenant = covenants.find(({ id }) => id === test.covenantId);
              const tested = covenant?.tests.find(({ testDate }) => testDate === test.testDate);
              if (!covenant || !tested) return [];
              return [
                <Row key={covenant.id}>
                  <NameCell name={covenant.name} second={limitText(covenant, tested.level)} />
                  <Cell nowrap>
                    {testedText(covenant, tested)}{' '}
                    <OutcomeText outcome={tested.outcome} justPassing={tested.justPassing} />
                  </Cell>
                  {SCENARIOS.map((name) => (
                    <ScenarioCell
                      key={name}
                      covenant={covenant}
                      level={tested.level}
                      result={test.scenarios[name]}
                    />
                  ))}
                </Row>,
              ];
            })}
          </TableBody>
        </Table>
      </ScrollRegion>
      <p className="type-second mt-2">
        Invented sizes, the same for every borrower; nothing says how likely they are.
      </p>
    </Panel>
  );
}

interface ScenarioCellProps {
  readonly covenant: CovenantView;
  readonly level: string | null;
  readonly result: ScenarioView;
}

function ScenarioCell({ covenant, level, result }: ScenarioCellProps) {
  if (result.kind === 'unknown')
    return (
      <Cell>
        <span className="type-second">cannot be computed: {result.reason}</span>
      </Cell>
    );
  return (
    <Cell nowrap>
      {testedText(covenant, { tested: result.tested, level })} <OutcomeText outcome={result.outcome} />
    </Cell>
  );
}
