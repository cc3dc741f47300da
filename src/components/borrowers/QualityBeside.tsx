import type { BesideFact } from '../../core/quality/score.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Panel } from '../ui/Panel.tsx';

/** What is looked at beside the score and never changes it. */
export function QualityBeside({ facts }: { readonly facts: readonly BesideFact[] }) {
  if (facts.length === 0) return null;
  return (
    <Panel title="Beside the score">
      <ul className="explanations">
        {facts.map(({ fact, sentence }) => (
          <li key={fact}>{sentence}</li>
        ))}
      </ul>
      <p className="type-second mt-2">
        None of it enters the score. <MethodLink topic="beside-the-score" />
      </p>
    </Panel>
  );
}
