import { run, type TaskList } from 'graphile-worker';
import { closeDatabase } from '@/db/client';
import { settings } from '@/lib/config/env';
import { checkAllLogs } from '@/lib/jobs/check-logs';
import { expireQuote } from '@/lib/jobs/expire-quote';
import { sendNotice } from '@/lib/jobs/send-notice';

/** Each task takes ids only and reads the rest with the rights of the person it acts for. */
const taskList: TaskList = {
  send_notice: (payload) => sendNotice((payload as { noticeId: string }).noticeId),
  expire_quote: (payload) => expireQuote(payload as { orderId: string; revision: number; shopId: string }),
  check_logs: () => checkAllLogs(),
};

const { JOBS_DATABASE_URL } = settings();
if (JOBS_DATABASE_URL === undefined) throw new Error('JOBS_DATABASE_URL is not set.');
const runner = await run({
  connectionString: JOBS_DATABASE_URL,
  concurrency: 4,
  noHandleSignals: true,
  pollInterval: 1000,
  taskList,
  crontab: '17 3 * * * check_logs',
});
console.log('worker ready');

const leave = async () => {
  await runner.stop();
  await closeDatabase();
  process.exit(0);
};
process.once('SIGTERM', () => void leave());
process.once('SIGINT', () => void leave());
await runner.promise;
