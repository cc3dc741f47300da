import { METHOD_TOPICS, type MethodTopic } from '../../contracts/methodTopics.ts';

interface MethodLinkProps {
  readonly topic: MethodTopic;
}

/** One click from a number to how it is computed: a pair of dividers, as a distance is taken off a chart. */
export function MethodLink({ topic }: MethodLinkProps) {
  const name = METHOD_TOPICS[topic];
  return (
    <a className="method-link" href={`/methods/${topic}`} aria-label={name} title={name}>
      <svg width="14" height="14" viewBox="0 0 14 14" aria-hidden="true" focusable="false">
        <circle className="mark-line" cx="7" cy="2.75" r="1.5" strokeWidth="1.25" />
        <path
          className="mark-line"
          d="M6.4 4.1L3 13M7.6 4.1L11 13M4.4 9.4q2.6 1.4 5.2 0"
          strokeWidth="1.25"
        />
      </svg>
    </a>
  );
}
