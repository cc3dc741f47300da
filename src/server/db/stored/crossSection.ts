/** The whole book on one night as stored: plain JSON that the repository wrote. */
import { NO_BOOK, type BookCrossSection } from '../../../core/bookCrossSection.ts';

/** What a night did not keep yet stands in it as before the first night: there are no peers for it. */
export const readCrossSection = (content: string): BookCrossSection => ({
  ...NO_BOOK,
  ...(JSON.parse(content) as Partial<BookCrossSection>),
});
