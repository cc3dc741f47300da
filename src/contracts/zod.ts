/** zod without code made at run time: the content security policy refuses that in a page, and reports the attempt. */
import { config, z } from 'zod';

config({ jitless: true });

export { z };
