import { openRoute } from '@/lib/server/http';
import { openApiDocument } from '@/lib/server/openapi';

export const GET = openRoute(() => openApiDocument());
