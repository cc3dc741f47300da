import {
  REVIEW_SECTIONS,
  type ReviewSheet,
  type SheetBlock,
  type SheetSection,
} from '../../../contracts/reviewSheet.ts';
import { HUMAN_DECISION_REQUIRED } from '../../../core/cautions.ts';
import { breakEvenSection } from './breakEven.ts';
import { bridgeSection } from './bridge.ts';
import { changesSection } from './changes.ts';
import { covenantSection } from './covenantTable.ts';
import { basisLine, headerSection, privateSideMark } from './header.ts';
import type { SheetMaterial } from './material.ts';
import { justPassingSection, qualitySection } from './quality.ts';
import { signalsSection } from './signals.ts';
import { rightsSection } from './rights.ts';
import { sheetSources } from './sources.ts';

type Title = (typeof REVIEW_SECTIONS)[number];

/** Sections that fill themselves; every other one stands with its heading until people write it. */
const FILLED: Partial<Record<Title, (material: SheetMaterial) => readonly SheetBlock[]>> = {
  Header: headerSection,
  'What changed since the last sheet': changesSection,
  'Covenant table': covenantSection,
  'Break-even and projection': breakEvenSection,
  'Bridge from reported to covenant EBITDA': bridgeSection,
  'Reporting quality': qualitySection,
  'Just-passing pattern': justPassingSection,
  'Signals open and closed': signalsSection,
  'Waivers, amendments, cures used': rightsSection,
};

/** Stands where a person decides, also while nothing is recorded there. */
const WHERE_DECIDED: Title = 'Sign-off and annex';

/** The committee's sheet out of what is known at its cut-off. The same material gives the same sheet. */
export function reviewSheet(material: SheetMaterial): ReviewSheet {
  return {
    state: 'draft',
    borrowerId: material.view.id,
    borrowerName: material.view.name,
    madeAt: material.madeAt.toISOString(),
    basisLine: basisLine(material),
    privateSide: privateSideMark(material),
    sections: REVIEW_SECTIONS.map((title, place) => section(material, title, place + 1)),
    sources: sheetSources(material),
  };
}

function section(material: SheetMaterial, title: Title, number: number): SheetSection {
  const fill = FILLED[title];
  if (fill) return { number, title, isRecorded: true, blocks: fill(material) };
  const blocks: readonly SheetBlock[] =
    title === WHERE_DECIDED ? [{ kind: 'caution', text: HUMAN_DECISION_REQUIRED }] : [];
  return { number, title, isRecorded: false, blocks };
}
