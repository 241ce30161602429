import { unstable_rethrow } from 'next/navigation';
import { z } from 'zod';
import { requireTicket } from '@/lib/auth/ticket';
import { AppError } from '@/lib/errors';
import { toProblemResponse } from '@/lib/http/problem';
import { answerJson } from '@/lib/http/route';
import { requireSameOrigin } from '@/lib/http/same-origin';
import { readUpload } from '@/lib/http/upload';
import { keepFile } from '@/lib/services/files';

/** Keeps one file of an order. A picture sent twice is two pictures: nothing but its own bytes names it. */
export async function POST(request: Request): Promise<Response> {
  try {
    requireSameOrigin(request);
    const ticket = await requireTicket();
    const { fields, ...file } = await readUpload(request);
    const orderId = z.uuid().safeParse(fields['orderId']);
    if (!orderId.success) throw new AppError('not_found', 'There is no such order.');
    return answerJson(await keepFile(ticket, orderId.data, file), { status: 201 });
  } catch (error) {
    unstable_rethrow(error);
    return toProblemResponse(error);
  }
}
