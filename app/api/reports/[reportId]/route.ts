import { refusalResponse, routeContext } from '@/lib/auth/context';
import { readReport } from '@/lib/reports/queries';

/** A grade report's PDF as a download. */
export async function GET(request: Request, { params }: { params: Promise<{ reportId: string }> }): Promise<Response> {
  const context = await routeContext(request, 'registrar', 'instructor', 'student');
  if (!context.ok) return refusalResponse(context);
  const report = await readReport(context.value, (await params).reportId);
  if (!report.ok) return refusalResponse(report);
  return new Response(new Uint8Array(report.value.pdf), {
    headers: {
      'content-type': 'application/pdf', 'content-disposition': `attachment; filename="${report.value.name}"`,
      'cache-control': 'no-store', 'x-content-type-options': 'nosniff',
    },
  });
}
