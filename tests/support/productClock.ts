/** A test that speaks with the product lives in the same hour as the product. */
import { inject } from 'vitest';

process.env['CLOCK_OFFSET_MS'] = inject('productSettings')['CLOCK_OFFSET_MS'];
await import('./pinnedClock.mjs');
