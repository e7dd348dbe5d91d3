import { appDb } from '@/db/client';
import { config } from '@/lib/config';
import { readSunkFile } from '@/lib/mail/queries';

/** A file of a message in the sink, always as a download. */
export async function GET(_request: Request, { params }: { params: Promise<{ mailId: string; place: string }> }): Promise<Response> {
  const { mailId, place } = await params;
  const file = await readSunkFile(appDb(), config().kind, Number(mailId), Number(place));
  if (!file.ok) return new Response(null, { status: 404 });
  const { name, type, content } = file.value;
  return new Response(new Uint8Array(content), {
    headers: { 'content-type': type, 'content-disposition': `attachment; filename*=UTF-8''${encodeURIComponent(name)}`, 'cache-control': 'no-store' },
  });
}
