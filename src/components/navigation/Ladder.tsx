import { useId } from 'react';

/** The chart-scale ladder under the active section: ink and sheet blocks along a line. */
export function Ladder() {
  const id = useId();
  return (
    <svg className="ladder" aria-hidden="true" focusable="false">
      <defs>
        <pattern id={id} width="16" height="6" patternUnits="userSpaceOnUse">
          <rect className="fill-ink" width="8" height="6" />
          <rect className="fill-sheet" x="8" y="1" width="8" height="5" />
          <rect className="fill-ink" x="8" width="8" height="1" />
        </pattern>
      </defs>
      <rect width="100%" height="6" fill={`url(#${id})`} />
    </svg>
  );
}
