import { CAUTIONS } from '../../core/cautions.ts';
import { Caution } from '../ui/States.tsx';

/** The four fixed texts, word for word, where a result is shown that people act on. */
export function Cautions() {
  return (
    <div className="cautions">
      {CAUTIONS.map((text) => (
        <Caution key={text}>{text}</Caution>
      ))}
    </div>
  );
}
