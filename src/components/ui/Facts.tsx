import type { ReactNode } from 'react';
import { classes } from './classes.ts';

export interface Fact {
  readonly label: ReactNode;
  readonly value: ReactNode;
  /** Names the row where label is not text. */
  readonly key?: string;
}

interface FactsProps {
  readonly facts: readonly Fact[];
  /** Words instead of figures: values stand left. */
  readonly text?: boolean;
}

/** Labels with their values, ruled, figures at the right. */
export function Facts({ facts, text }: FactsProps) {
  return (
    <dl className={classes('facts', text && 'facts-text')}>
      {facts.map((fact, position) => (
        <div key={fact.key ?? (typeof fact.label === 'string' ? fact.label : position)}>
          <dt>{fact.label}</dt>
          <dd>{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}
