import { POPULATION_NOT_BORROWER } from '../../core/cautions.ts';
import type { MeasureCode } from '../../core/measures/measure.ts';
import type { CovenantNearLine } from '../../core/patterns/nearLine.ts';
import {
  isDebtToEbitda,
  LEVERAGE_SENTENCE,
  NOT_ENOUGH_NEAR,
  nearLineFacts,
  nearLineSentence,
} from '../../core/patterns/patternWording.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Caution } from '../ui/States.tsx';

interface NearLineEvidenceProps {
  readonly nearLine: CovenantNearLine;
  readonly measure: MeasureCode;
}

/** How the tests that ended near the limit lie, beside what the whole book leads one to expect. */
export function NearLineEvidence({ nearLine: { figures }, measure }: NearLineEvidenceProps) {
  return (
    <section>
      <h3 className="type-heading">
        Tests near the limit <MethodLink topic="just-passing-patterns" />
      </h3>
      <p>{sentence(figures ? nearLineSentence(figures) : NOT_ENOUGH_NEAR)}, as of last night.</p>
      {figures && (
        <>
          <Facts text facts={nearLineFacts(figures)} />
          {isDebtToEbitda(measure) && <p className="type-second mt-2">{LEVERAGE_SENTENCE}</p>}
          <div className="cautions">
            <Caution>{POPULATION_NOT_BORROWER}</Caution>
          </div>
        </>
      )}
    </section>
  );
}

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
