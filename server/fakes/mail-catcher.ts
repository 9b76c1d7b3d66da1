import * as z from 'zod';
import { stopOnRequest } from './listen';
import { startMailCatcher } from './mail/catcher';

/** The mail catcher as a process of its own; configured by its environment. */
const port = z.coerce.number().int().min(0).max(65_535);
const settings = z
  .object({ PORT: port, SMTP_PORT: port, MAIL_FOLDER: z.string().min(1) })
  .parse(process.env);

const catcher = await startMailCatcher({
  port: settings.PORT,
  smtpPort: settings.SMTP_PORT,
  folder: settings.MAIL_FOLDER,
});
stopOnRequest(() => catcher.stop());
console.log(`Mail catcher is ready at ${catcher.url}, SMTP on port ${catcher.smtpPort}`);
