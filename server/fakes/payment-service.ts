import * as z from 'zod';
import { stopOnRequest } from './listen';
import { readKnownPayments } from './payments/known-payments';
import { startPaymentService } from './payments/service';

/** The stand-in of the payment service as a process of its own; configured by its environment. */
const settings = z
  .object({
    PORT: z.coerce.number().int().min(0).max(65_535),
    STATE_FILE: z.string().min(1),
    WEBHOOK_URL: z.url({ protocol: /^https?$/ }),
    WEBHOOK_SECRET: z.string().min(16),
    PUBLIC_URL: z.url({ protocol: /^https?$/ }).optional(),
    API_KEY: z.string().min(1).optional(),
    KNOWN_PAYMENTS: z.string().min(1).optional(),
  })
  .parse(process.env);

const knownPayments = settings.KNOWN_PAYMENTS
  ? await readKnownPayments(settings.KNOWN_PAYMENTS)
  : [];
const service = await startPaymentService({
  port: settings.PORT,
  stateFile: settings.STATE_FILE,
  webhookUrl: settings.WEBHOOK_URL,
  webhookSecret: settings.WEBHOOK_SECRET,
  knownPayments,
  ...(settings.PUBLIC_URL === undefined
    ? {}
    : { publicUrl: settings.PUBLIC_URL.replace(/\/+$/, '') }),
  ...(settings.API_KEY === undefined ? {} : { apiKey: settings.API_KEY }),
});
stopOnRequest(() => service.stop());
console.log(`Payment service stand-in is ready at ${service.url}`);
