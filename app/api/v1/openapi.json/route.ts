import { settings } from '@/lib/config/env';
import { openApiDocument } from '@/lib/http/openapi';

export const dynamic = 'force-dynamic';

/** The interface for programs, described from the schemas that check it. Open to everybody: it holds nobody's data. */
export function GET(): Response {
  return Response.json(openApiDocument(new URL(settings().APP_URL).origin));
}
