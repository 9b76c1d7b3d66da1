import * as z from 'zod';

// Without this zod probes `new Function`, which the content security policy reports as a violation.
z.config({ jitless: true });
