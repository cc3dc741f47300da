/// <reference types="astro/client" />
import type { Person as SignedInPerson } from './server/auth/policy.ts';

declare global {
  namespace App {
    interface Locals {
      /** A person with a live session, or nobody. */
      person: SignedInPerson | null;
      /** Names of the person's desks, for the top bar. */
      deskNames: readonly string[];
      /** Open alerts on the desks that the person reads; null where the person reads none. */
      openAlerts: number | null;
      /** Changes of the policy that wait for this person's decision; null where the person decides none. */
      policyToDecide: number | null;
      sessionId: string | null;
      requestId: string;
      /** The client's address as the socket (or the named proxy) gives it. */
      address: string;
      now: Date;
    }
  }
}
