/** Set-up of the project `database`: a migrated database with both accounts, and the server for those who make their own. */
import type { TestProject } from 'vitest/node';
import { grantToApplication } from '../../src/server/db/grants.ts';
import { migrateUp } from '../../src/server/db/migrator.ts';
import { freshDatabase, holdServer, releaseServer } from './localServer.ts';

declare module 'vitest' {
  interface ProvidedContext {
    databaseUrl: string;
    databaseOwnerUrl: string;
    databaseServer: { port: number; socket: string; adminUser: string };
  }
}

export async function setup(project: TestProject): Promise<void> {
  const server = await holdServer();
  const { url, ownerUrl } = await freshDatabase(server);
  await migrateUp(ownerUrl);
  await grantToApplication(ownerUrl, url);
  project.provide('databaseUrl', url);
  project.provide('databaseOwnerUrl', ownerUrl);
  project.provide('databaseServer', {
    port: server.port,
    socket: server.socket,
    adminUser: server.adminUser,
  });
}

export const teardown = (): Promise<void> => releaseServer();
