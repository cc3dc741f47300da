import {
  NOT_RECORDED,
  type REVIEW_SECTIONS,
  type ReviewSheet,
  type SheetBlock,
  type SheetSection,
} from '../../contracts/reviewSheet.ts';
import { LinkButton } from '../ui/Button.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import type { MethodTopic } from '../../contracts/methodTopics.ts';
import { MethodLink } from '../marks/MethodLink.tsx';
import { Caution } from '../ui/States.tsx';
import { SheetCellText } from './SheetCellText.tsx';
import { SheetTable } from './SheetTable.tsx';

type Title = (typeof REVIEW_SECTIONS)[number];

/** How the figures of a section are computed; a section of words has none. */
const METHODS: Readonly<Partial<Record<Title, readonly MethodTopic[]>>> = {
  Header: ['data-cut-off', 'exposure'],
  'What changed since the last sheet': ['data-cut-off'],
  'Covenant table': ['headroom', 'sounding-strip', 'counterfactual-tests'],
  'Break-even and projection': ['headroom', 'smallest-headroom'],
  'Bridge from reported to covenant EBITDA': ['twelve-months'],
  'Reporting quality': ['reporting-quality'],
  'Just-passing pattern': ['just-passing-patterns'],
  'Signals open and closed': ['alerts', 'alert-due-dates'],
  'Waivers, amendments, cures used': ['cures-and-waivers'],
};

/** The committee's sheet, section by section in its fixed order; what nobody has written yet stands with its heading. */
export function ReviewSheetPage({ sheet }: { readonly sheet: ReviewSheet }) {
  return (
    <Panel
      className="review-sheet"
      title="Review sheet"
      aside={
        <span className="review-aside">
          <span className="tag">DRAFT</span>
          <span className="type-second">{sheet.basisLine}</span>
          <LinkButton look="primary" href={`/api/v1/borrowers/${sheet.borrowerId}/review-sheet`} download>
            Export as XLSX
          </LinkButton>
        </span>
      }
    >
      {sheet.privateSide !== null && <p className="type-name">{sheet.privateSide}</p>}
      {sheet.sections.map((section) => (
        <Section key={section.number} section={section} />
      ))}
    </Panel>
  );
}

function Section({ section: { number, title, isRecorded, blocks } }: { readonly section: SheetSection }) {
  return (
    <section className="review-section" aria-labelledby={`section-${number}`}>
      <h3 id={`section-${number}`} className="type-heading review-heading">
        <span className="review-number">{number}</span> {title}
        {METHODS[title as Title]?.map((topic) => (
          <MethodLink key={topic} topic={topic} />
        ))}
        {!isRecorded && <span className="review-empty type-second">{NOT_RECORDED}</span>}
      </h3>
      {blocks.map((block, place) => (
        <Block key={place} block={block} />
      ))}
    </section>
  );
}

function Block({ block }: { readonly block: SheetBlock }) {
  switch (block.kind) {
    case 'facts':
      return (
        <div className="review-facts">
          <Facts
            text
            facts={block.facts.map(({ label, value }) => ({ label, value: <SheetCellText cell={value} /> }))}
          />
        </div>
      );
    case 'table':
      return <SheetTable {...block} />;
    case 'list':
      return (
        <ul className="explanations">
          {block.lines.map((line) => (
            <li key={line}>{line}</li>
          ))}
        </ul>
      );
    case 'paragraph':
      return <p>{block.text}</p>;
    case 'caution':
      return <Caution>{block.text}</Caution>;
  }
}
