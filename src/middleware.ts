/** The door: every request passes these stages, outermost first. The pieces are in src/server/http. */
import { sequence } from 'astro:middleware';
import { isOutage } from './server/db/inTransaction.ts';
import {
  barCountStage,
  headerStage,
  methodStage,
  originStage,
  outageStage,
  refusalStage,
  requestStage,
  requireUserStage,
  sessionStage,
} from './server/http/stages.ts';
import { barCounts } from './server/services/barCounts.ts';
import { currentPerson } from './server/services/currentPerson.ts';
import { recordRefusal } from './server/services/recordRefusal.ts';

/**
 * The server hands in the socket's address; the development server has none to hand in, and draws pages with
 * scripts of its own. Asked at run time: what stands in import.meta.env is whatever the build's shell had set.
 */
const isDevelopment = process.env['NODE_ENV'] === 'development';

export const onRequest = sequence(
  requestStage((context) => (isDevelopment ? context.clientAddress : 'unknown')),
  headerStage(isDevelopment),
  outageStage(isOutage),
  originStage,
  sessionStage(currentPerson),
  refusalStage(recordRefusal),
  requireUserStage,
  barCountStage(barCounts),
  methodStage,
);
