import type { PolicyVersionRow } from '../../contracts/policy.ts';
import { addDays, plainDate } from '../../core/calendar/plainDate.ts';
import { dayText, formatDay } from '../../core/calendar/printDay.ts';
import { instantText } from '../runs/runWords.ts';
import { Panel } from '../ui/Panel.tsx';

interface PolicyVersionsProps {
  readonly versions: readonly PolicyVersionRow[];
  readonly zone: string;
}

/** Every version with its days and its two persons, the latest first. */
export function PolicyVersions({ versions, zone }: PolicyVersionsProps) {
  return (
    <Panel title="Versions">
      <p className="type-second mb-3">
        A result keeps the version that it was computed with. A run for a past day uses the policy of that
        day.
      </p>
      <ol className="policy-versions">
        {versions.map((version) => (
          <li key={version.version}>
            <p>
              <span className="type-name">Version {version.version}</span>, {version.standing}
              <span className="type-second type-small block">{daysText(version)}</span>
            </p>
            {version.confirmedBy !== null && version.confirmedAt !== null && (
              <p className="type-small">
                Proposed by {version.proposedBy}, confirmed by {version.confirmedBy},{' '}
                {instantText(version.confirmedAt, zone)}. {version.reason}
              </p>
            )}
            {version.changes.length > 0 && (
              <ul className="type-small sentences">
                {version.changes.map((change) => (
                  <li key={change.key}>
                    {change.label}: {change.before} → <span className="type-name">{change.after}</span>
                  </li>
                ))}
              </ul>
            )}
            {version.confirmedBy === null && (
              <p className="type-small">Desk practice that the product brings; no source.</p>
            )}
          </li>
        ))}
      </ol>
    </Panel>
  );
}

function daysText({ validFrom, validTo, standing }: PolicyVersionRow): string {
  const from = validFrom === null ? 'from the beginning' : `from ${dayText(validFrom)}`;
  if (validTo === null) return from;
  if (standing === 'never in force')
    return `${from}; another version took its place for ${formatDay(addDays(plainDate(validTo), 1))}`;
  return `${from} to ${dayText(validTo)}`;
}
