import { z } from 'zod';

/**
 * The policy of the page lets nothing be evaluated from text. zod would try whether it may, and the browser would write
 * that try to its console. Imported before every schema is made.
 */
z.config({ jitless: true });
