/** Sheets that their own names set aside ('old', 'do not use'): read only by the analyst's word. */
import type { Asking } from './asking.ts';
import type { TableFact } from './facts.ts';
import { plainText } from './plainWords.ts';
import { LEAVE_OUT } from './statements.ts';

const NAMES =
  /(?<![a-z])(?:old|do not use|don'?t use|not used|superseded|obsolete|archived?|backup|bak|nicht verwenden|nicht benutzen|alt|veraltet|ancien(?:ne)?|obsolete|ne pas utiliser|antigu[oa]|viej[oa]|no usar|gammal)(?![a-z])/;

/** Facts of such sheets wait for an answer; what another sheet says as well has been taken from there already. */
export function withoutSetAside(facts: readonly TableFact[], asking: Asking): TableFact[] {
  return facts.flatMap((fact) => {
    const { sheet } = fact;
    if (!NAMES.test(plainText(sheet))) return [fact];
    const key = `which-sheets:${sheet}`.slice(0, 190);
    const answer = asking.ask({
      key,
      kind: 'which-sheets',
      holdsFor: 'layout',
      text: `The name of sheet '${sheet}' says that it is no longer meant, and it holds figures that no other sheet has (first '${fact.label}' to ${fact.periodEnd}). Read it?`,
      where: [{ sheet, cell: fact.cell }],
      options: [
        { value: sheet, label: `Read '${sheet}' as well` },
        { value: LEAVE_OUT, label: 'Leave it out' },
      ],
    });
    if (answer === null) return [{ ...fact, waitsFor: [...fact.waitsFor, key] }];
    return answer === sheet ? [fact] : [];
  });
}
