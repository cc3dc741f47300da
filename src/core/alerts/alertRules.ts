/** The register: one rule a kind. To add one: a file, a line here, a kind in alert.ts. */
import type { AlertFinding } from './alert.ts';
import { headroomShrinking } from './headroomShrinking.ts';
import { justPassingRepeated } from './justPassingRepeated.ts';
import { metOnlyWithAddBacks } from './metOnlyWithAddBacks.ts';
import { pattern } from './pattern.ts';
import { metOnlyOnAccruals } from './metOnlyOnAccruals.ts';
import { pastOurTrigger } from './pastOurTrigger.ts';
import { priorFiguresRestated } from './priorFiguresRestated.ts';
import { qualityFell } from './qualityFell.ts';
import { qualityWeak } from './qualityWeak.ts';
import type { AlertContext, AlertRule } from './rule.ts';
import { runningOut } from './runningOut.ts';
import { statementLate } from './statementLate.ts';
import { stepDownAhead } from './stepDownAhead.ts';
import { testNotMet } from './testNotMet.ts';
import { thinHeadroom } from './thinHeadroom.ts';

const ALERT_RULES: readonly AlertRule[] = [
  testNotMet,
  runningOut,
  pastOurTrigger,
  thinHeadroom,
  justPassingRepeated,
  pattern,
  metOnlyWithAddBacks,
  metOnlyOnAccruals,
  stepDownAhead,
  headroomShrinking,
  qualityFell,
  qualityWeak,
  priorFiguresRestated,
  statementLate,
];

/**
 * What every rule finds. The rules and their severities are the desk's policy; none speaks of intent or of chance.
 *
 * @example findingsOf(nightOf({ ebitda: 12, debt: 45, cash: 6 })).map(({ kind }) => kind) // => ['thin headroom']
 */
export const findingsOf = (context: AlertContext): readonly AlertFinding[] =>
  ALERT_RULES.flatMap((rule) => rule(context));
