import { monthCount } from '../../core/calendar/plainDate.ts';
import { dayText } from '../../core/calendar/printDay.ts';
import type { BorrowerView } from '../../contracts/borrowers.ts';
import { NO_FINDING_OF_MISCONDUCT } from '../../core/cautions.ts';
import type { QualityBlock, ReportingQuality } from '../../core/quality/score.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { QualityBar, RuledScale } from '../marks/QualityBar.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution } from '../ui/States.tsx';
import { BLOCK_TOPICS } from './qualityRows.ts';

/** Reporting quality beside the covenants: the number, its blocks, why. */
export function QualitySummary({
  borrower,
}: {
  readonly borrower: Pick<BorrowerView, 'quality' | 'computed'>;
}) {
  const { quality, computed } = borrower;
  if (!quality)
    return (
      <Panel title="Reporting quality">
        <p className="type-second">Not assessed yet.</p>
      </Panel>
    );
  const { latest } = quality;
  return (
    <Panel title="Reporting quality">
      <p className="mb-1">
        <QualityBar
          score={quality.headline}
          band={quality.band}
          noScoreReason={quality.noScoreReason}
          provisional={quality.provisional}
        />
      </p>
      {latest && (
        <p className="type-second">
          {meanText(quality)}, coverage {latest.coverage} of 100, {latest.sectorPeers} peers in the sector
          {latest.sectorWeight < 1 && `, leaning on ${latest.bookPeers} borrowers of the whole book`}
          {computed?.peersAreLastNights && ', peers as of last night'}{' '}
          <MethodLink topic="reporting-quality" />
        </p>
      )}
      {latest && (
        <h3 className="type-heading mt-3">
          Quarter to {dayText(latest.quarterEnd)}:{' '}
          {latest.score === null ? 'no score' : Math.round(latest.score)}
        </h3>
      )}
      {latest?.score === null && quality.headline !== null && (
        <p>{latest.noScoreReason} The headline is of the quarter ends before it.</p>
      )}
      {latest && <BlockList blocks={latest.blocks} />}
      {quality.explanations.length > 0 && (
        <ul className="explanations">
          {quality.explanations.map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      )}
      {quality.whatWouldChangeIt && <p className="mt-2">{quality.whatWouldChangeIt}</p>}
      {quality.remarks.map((remark) => (
        <p key={remark} className="type-second mt-1">
          {remark}
        </p>
      ))}
      <div className="mt-3">
        <Caution>{NO_FINDING_OF_MISCONDUCT}</Caution>
      </div>
    </Panel>
  );
}

/** Of how many quarter ends the headline is the mean: those within half a year of the latest. */
function meanText({ headline, history, latest, provisional }: ReportingQuality): string {
  if (headline === null || !latest) return 'No headline';
  if (provisional) return 'One quarter end only, provisional';
  const scored = history.filter(
    ({ score, quarterEnd }) =>
      score !== null && monthCount(latest.quarterEnd) - monthCount(quarterEnd) <= MONTHS_OF_HEADLINE,
  );
  return `Mean of the last ${scored.length === 2 ? 'two' : 'three'} quarter ends`;
}

const MONTHS_OF_HEADLINE = 6;

/** 100 is well supported: a block's number is 100 less its risk in per cent. */
export const blockScore = (block: QualityBlock): number | null =>
  block.risk === null ? null : Math.round(100 * (1 - block.risk));

function BlockList({ blocks }: { readonly blocks: readonly QualityBlock[] }) {
  return (
    <dl className="facts">
      {blocks.map((block) => {
        const score = blockScore(block);
        return (
          <div key={block.name}>
            <dt>
              {block.name.charAt(0).toUpperCase() + block.name.slice(1)}{' '}
              <MethodLink topic={BLOCK_TOPICS[block.name]} />
              <span className="type-second type-small block">
                weight {block.weight}
                {block.reason !== null && `, ${block.reason}`}
              </span>
            </dt>
            <dd>
              {score === null ? (
                <span className="type-second">not available</span>
              ) : (
                <span className="inline-flex items-center gap-3">
                  <RuledScale score={score} />
                  <span className="type-name min-w-6">{score}</span>
                </span>
              )}
            </dd>
          </div>
        );
      })}
    </dl>
  );
}
