/** A web process of a test's own beside the running product, on the product's database unless told otherwise. */
import { inject } from 'vitest';
import { freePort } from '../../jobs/database.mjs';
import { untilAnswers } from '../../jobs/serve.mjs';
import { startProgram, type Program } from './program.ts';

export interface WebProcess extends Program {
  readonly address: string;
}

export async function startWebProcess(settings: Readonly<Record<string, string>> = {}): Promise<WebProcess> {
  const port = await freePort();
  const address = `http://127.0.0.1:${port}`;
  const program = startProgram('jobs/server.ts', {
    ...inject('productSettings'),
    APP_URL: address,
    PORT: String(port),
    ...settings,
  });
  if (!(await untilAnswers(`${address}/livez`, () => false)))
    throw new Error(`the web process did not come up:\n${program.output()}`);
  return { ...program, address };
}
