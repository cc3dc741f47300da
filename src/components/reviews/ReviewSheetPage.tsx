import {
  NOT_RECORDED,
  type ReviewSheet,
  type SheetBlock,
  type SheetSection,
} from '../../contracts/reviewSheet.ts';
import { LinkButton } from '../ui/Button.tsx';
import { Facts } from '../ui/Facts.tsx';
import { Panel } from '../ui/Panel.tsx';
import { Caution } from '../ui/States.tsx';
import { SheetCellText } from './SheetCellText.tsx';
import { SheetTable } from './SheetTable.tsx';

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
