import type { Context } from '@/lib/context';
import { done, notFound, type Result } from '@/lib/result';
import { drawTemplate } from '@/lib/templates/draw';
import { type Question, toQuestion } from '@/lib/templates/question';
import { assemblePaper } from './assemble';
import type { PaperContent } from './paper';
import { examPage } from './queries';
import { readVersions } from './templates';
import { versionIdsOf } from './queries';

/**
 * A paper of the exam as it is stored now, as a candidate would see it, drawn from `seed`. Nothing is kept, and no sitting
 * ever draws from such seeds. Instructors only.
 */
export async function previewPaper(context: Context, examId: string, seed: string): Promise<Result<PaperContent>> {
  const exam = await examPage(context, examId);
  if (!exam.ok) return notFound();
  const { content, title } = exam.value;
  const versions = await readVersions(context, versionIdsOf(content));
  if (!versions.ok) return versions;
  const questions: Question[] = [];
  for (const [index, { template }] of versions.value.entries()) {
    const draw = drawTemplate(template, `preview ${seed}:${index + 1}`, { locale: content.locale });
    if (!draw.ok) return draw;
    questions.push(toQuestion(template, draw.value));
  }
  return done(assemblePaper(title, content, questions));
}
