import { METHOD_TOPICS, type MethodTopic } from '../../contracts/methodTopics.ts';

interface MethodLinkProps {
  readonly topic: MethodTopic;
  /** Its name in words beside the mark. */
  readonly named?: boolean;
}

/** One click from a number to how it is computed: a pair of dividers, as a distance is taken off a chart. */
export function MethodLink({ topic, named = false }: MethodLinkProps) {
  const name = METHOD_TOPICS[topic];
  const href = `/methods/${topic}`;
  if (named)
    return (
      <a className="method-link-named" href={href}>
        <Dividers /> {name}
      </a>
    );
  return (
    <a className="method-link" href={href} aria-label={name} title={name}>
      <Dividers />
    </a>
  );
}

const Dividers = () => (
  <svg
    className="method-mark"
    width="14"
    height="14"
    viewBox="0 0 14 14"
    aria-hidden="true"
    focusable="false"
  >
    <circle className="mark-line" cx="7" cy="2.75" r="1.5" strokeWidth="1.25" />
    <path className="mark-line" d="M6.4 4.1L3 13M7.6 4.1L11 13M4.4 9.4q2.6 1.4 5.2 0" strokeWidth="1.25" />
  </svg>
);

/** The links of a table's heads once more, under it, where a narrow screen folds its rows and takes the heads away. */
export function FoldedMethodLinks({ topics }: { readonly topics: readonly MethodTopic[] }) {
  return (
    <ul className="method-links-folded">
      {topics.map((topic) => (
        <li key={topic}>
          <MethodLink topic={topic} named />
        </li>
      ))}
    </ul>
  );
}
