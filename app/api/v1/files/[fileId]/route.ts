import { z } from 'zod';
import { route } from '@/lib/http/route';
import { openFile } from '@/lib/services/files';

/** Opens a file that the asker may see, by a link that lives a minute. */
export const GET = route({
  params: z.object({ fileId: z.uuid() }),
  handle: async ({ ticket, params, request }) => {
    const isSmall = new URL(request.url).searchParams.has('small');
    const location = await openFile(ticket, params.fileId, isSmall);
    return new Response(null, { status: 302, headers: { location, 'cache-control': 'private, no-store' } });
  },
});
