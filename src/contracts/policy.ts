/** The policy as pages and the interface show it. */
import type { PolicyKey } from '../core/policySettings.ts';

/** Values in force on a day, as printed, with their units. */
export interface PolicyInForce {
  readonly version: number;
  readonly day: string;
  readonly values: Readonly<Record<PolicyKey, string>>;
}
