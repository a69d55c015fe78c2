/** The process is alive; nothing else is asked. */
export function GET(): Response {
  return Response.json({ status: 'alive' }, { headers: { 'cache-control': 'no-store' } });
}
