import type { MethodExample, MethodPage } from '../../contracts/methods.ts';
import type { PolicyInForce } from '../../contracts/policy.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import { METHOD_SETTINGS, type MethodSettingKey } from '../../core/methodSettings.ts';
import { METHOD_VERSION } from '../../core/policy.ts';
import { policySetting, type PolicyKey } from '../../core/policySettings.ts';
import { lineItem } from '../../core/statements/lineItems.ts';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';

/** The formula as it is computed, one line a step, then the figures that a test runs. */
export function FormulaPanel({ formula, unit, examples }: MethodPage) {
  return (
    <Panel title="Formula">
      <div className="grid gap-4">
        <ul className="formula">
          {formula.map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
        <p className="type-second">Unit: {unit}</p>
        {examples.length > 0 && <Examples examples={examples} />}
      </div>
    </Panel>
  );
}

const Examples = ({ examples }: { readonly examples: readonly MethodExample[] }) => (
  <div>
    <h3 className="type-heading mb-1">Worked figures</h3>
    <Facts facts={examples.map(({ text, comesTo }) => ({ label: text, value: comesTo }))} />
  </div>
);

/** What goes in: lines of the accounts by name, then other results. */
export function InputsPanel({ lines, inputs }: MethodPage) {
  return (
    <Panel title="What goes in">
      <div className="grid gap-3">
        {lines.length > 0 && (
          <p>
            <span className="type-name">Lines of the accounts: </span>
            {lines.map((line) => lineItem(line).label).join(', ')}
          </p>
        )}
        <Sentences sentences={inputs} />
      </div>
    </Panel>
  );
}

export const SentencesPanel = ({
  title,
  sentences,
}: {
  readonly title: string;
  readonly sentences: readonly string[];
}) => (
  <Panel title={title}>
    <Sentences sentences={sentences} />
  </Panel>
);

const Sentences = ({ sentences }: { readonly sentences: readonly string[] }) => (
  <ul className="sentences">
    {sentences.map((sentence) => (
      <li key={sentence}>{sentence}</li>
    ))}
  </ul>
);

const isOfMethod = (key: PolicyKey | MethodSettingKey): key is MethodSettingKey => key in METHOD_SETTINGS;

interface SettingsPanelProps {
  readonly settings: MethodPage['settings'];
  readonly policy: PolicyInForce;
}

/** The values by which it is computed today: the policy's out of the stored policy, the others out of the program. */
export function SettingsPanel({ settings, policy }: SettingsPanelProps) {
  const facts = settings.map((key) =>
    isOfMethod(key) ? METHOD_SETTINGS[key] : { label: policySetting(key).label, value: policy.values[key] },
  );
  const ofPolicy = settings.some((key) => !isOfMethod(key));
  return (
    <Panel title="Settings in force">
      {facts.length === 0 ? <p>No setting: the formula holds as it stands.</p> : <Facts facts={facts} />}
      {ofPolicy && (
        <p className="type-second mt-3">
          From policy version {policy.version}, in force on {dayText(policy.day)}. Two persons change it; what
          was computed before keeps its version. <a href="/desk-settings/policy">Policy and its versions</a>
        </p>
      )}
    </Panel>
  );
}

/** Which version of the methods computes it. */
export const VersionPanel = ({ since }: MethodPage) => (
  <Panel title="Version">
    <Facts
      facts={[
        { label: 'Computed so since method version', value: since },
        { label: 'Method version of today', value: METHOD_VERSION },
      ]}
    />
    <p className="type-second mt-3">
      Every result names the method version, the policy version and the data cut-off that it was computed
      with, and keeps them.
    </p>
  </Panel>
);
