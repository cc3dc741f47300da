import type { CovenantView } from '../../contracts/borrowers.ts';
import { CovenantBridge, TestSources } from './CovenantBridge.tsx';
import { CovenantHeadroom, LaterLevels } from './CovenantHeadroom.tsx';
import { CovenantRights } from './CovenantRights.tsx';
import { NearLineEvidence } from './NearLineEvidence.tsx';
import { OtherReadings } from './OtherReadings.tsx';

/** Headroom in every form, rights, what the test would be otherwise, and the way from reported to covenant figures. */
export function CovenantDetail({ covenant }: { readonly covenant: CovenantView }) {
  return (
    <div className="stack">
      {covenant.isOurs && (
        <p>Ours, not in the agreement: a trigger of the desk, computed like a covenant and binding nobody.</p>
      )}
      {covenant.pattern && covenant.pattern.inBand > 0 && (
        <p>
          {covenant.pattern.inBand} of the last {covenant.pattern.ofLast} tests ended just passing
          {covenant.pattern.run > 1 && `, ${covenant.pattern.run} in a row`}.
        </p>
      )}
      {covenant.nearLine && <NearLineEvidence nearLine={covenant.nearLine} measure={covenant.measure} />}
      <div className="two-panels">
        <CovenantHeadroom covenant={covenant} />
        <OtherReadings covenant={covenant} />
      </div>
      <CovenantRights covenant={covenant} />
      <LaterLevels covenant={covenant} />
      {covenant.bridge.length > 0 && <CovenantBridge rows={covenant.bridge} measure={covenant.measure} />}
      <TestSources covenant={covenant} />
    </div>
  );
}
