import 'server-only';
import { logEvent } from '@/lib/adapters/log';
import { checkLogs } from '@/lib/services/log-check';
import { listShopsToCheck } from '@/lib/services/people';

/** Each night every order is rebuilt from its log and held against its tables; what differs is written to the log of the program. */
export async function checkAllLogs(): Promise<void> {
  let [checked, older] = [0, 0];
  for (const owner of await listShopsToCheck()) {
    const found = await checkLogs(owner);
    checked += found.checked;
    older += found.older;
    for (const difference of found.differences) logEvent('log.differs', { ...difference });
  }
  logEvent('log.checked', { checked, older });
}
