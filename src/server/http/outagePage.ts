/**
 * The page for a database that does not answer: plain, because drawing a full page would ask the database.
 *
 * @param outcome what became of what was sent, as a sentence of ours
 */
export function outagePage(requestId: string, retryAfterSeconds: number, outcome: string): Response {
  const html = `<!doctype html>
<html lang="en">
  <head>
    <meta charset="utf-8" />
    <meta name="viewport" content="width=device-width" />
    <title>Underkeel: the database does not answer</title>
  </head>
  <body>
    <h1>The database does not answer</h1>
    <p>${outcome} Go back, wait a few seconds and try again; what you typed is still on that page.</p>
    <p>If it goes on, give your administrator the request number ${requestId}.</p>
  </body>
</html>
`;
  return new Response(html, {
    status: 503,
    headers: { 'content-type': 'text/html; charset=utf-8', 'retry-after': String(retryAfterSeconds) },
  });
}
