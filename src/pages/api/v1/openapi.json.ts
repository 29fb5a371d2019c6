import { openApiDocument } from '@/lib/schemas/openapi';
import { endpoint, json } from '@/lib/server/http';

let document: ReturnType<typeof openApiDocument> | undefined;

export const GET = endpoint(() => {
  document ??= openApiDocument();
  return json(document, 200, { 'cache-control': 'public, max-age=300' });
});
