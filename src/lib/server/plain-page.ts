import type { AppError } from './errors';

/** A refusal as a page that needs nothing else to work: no style, no script, no layout. */
export function plainErrorPage({ status, message }: Pick<AppError, 'status' | 'message'>): Response {
  const text = escapeHtml(message);
  const html = `<!doctype html>
<html lang="en">
<head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><title>Slipband: not possible</title></head>
<body><main><h1>That did not work</h1><p>${text}</p><p><a href="/">Go to the start page</a></p></main></body>
</html>`;
  return new Response(html, {
    status,
    headers: { 'content-type': 'text/html; charset=utf-8', 'cache-control': 'no-store' },
  });
}

const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };
const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (sign) => ENTITIES[sign] ?? '');
