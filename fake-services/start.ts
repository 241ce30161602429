import path from 'node:path';
import { startMailbox } from './mailbox';
import { startObjectStore } from './object-store';

/** Starts the stand-ins for file storage and e-mail where the environment says. */
const port = (name: string) => Number(new URL(process.env[name] ?? 'none:').port);

const mailbox = await startMailbox({ smtpPort: port('SMTP_URL'), pagePort: port('MAILBOX_URL') });
const store = await startObjectStore({
  port: port('S3_ENDPOINT'),
  folder: path.join(process.env['FAKES_DIR'] ?? '.wiretag/fakes', 'objects'),
  accessKeyId: process.env['S3_ACCESS_KEY_ID'] ?? '',
  secretAccessKey: process.env['S3_SECRET_ACCESS_KEY'] ?? '',
  buckets: [process.env['S3_BUCKET'] ?? 'wiretag'],
});
console.log('stand-ins ready');

const leave = async () => {
  await mailbox.close();
  await store.close();
  process.exit(0);
};
process.once('SIGTERM', () => void leave());
process.once('SIGINT', () => void leave());
