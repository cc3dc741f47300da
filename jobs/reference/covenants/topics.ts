/** Every topic of the covenant vectors. */
import type { Topic } from '../topic.ts';
import { accountTopics } from './accounts.ts';
import { earningsTopics } from './earnings.ts';
import { periodTopics } from './periods.ts';
import { ratioTopics } from './ratios.ts';
import { rightsTopics } from './rights.ts';

export const covenantTopics: Readonly<Record<string, Topic>> = {
  ...periodTopics,
  ...earningsTopics,
  ...ratioTopics,
  ...rightsTopics,
  ...accountTopics,
};
