/** Every topic of the reporting-quality vectors, and the book that is scored together. */
import { topics as distressScores } from './distressScores.ts';
import { topics as publishedScores } from './publishedScores.ts';
import { topics as qualityScore } from './qualityScore.ts';
import { topics as regressions } from './regressions.ts';
import type { Topic } from './topic.ts';

export { qualityBook } from './qualityBook.ts';

export const topics: Record<string, Topic> = {
  ...qualityScore,
  ...publishedScores,
  ...distressScores,
  ...regressions,
};
