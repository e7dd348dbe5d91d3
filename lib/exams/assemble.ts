import { blocksOf } from '@/lib/templates/blocks';
import { blocksHtml } from '@/lib/templates/html';
import type { Question } from '@/lib/templates/question';
import type { ExamContent } from './model';
import type { PaperContent, PaperSection } from './paper';
import { materialsSay, passRuleSays } from './sums';

/** A text of an exam (instructions, formula sheet) as safe HTML with KaTeX. */
export const textHtml = (markdown: string): string => blocksHtml(blocksOf(markdown, () => null));

function sectionsOf(content: ExamContent, questions: readonly Question[]): PaperSection[] {
  let first = 1;
  return content.sections.flatMap((section) => {
    const last = first + section.items.length - 1;
    if (last < first) return [];
    const marks = questions.slice(first - 1, last).reduce((sum, question) => sum + question.marks, 0);
    const placed = { title: section.title, instructionsHtml: textHtml(section.instructions), first, last, marks };
    first = last + 1;
    return [placed];
  });
}

/** One candidate's paper: the exam's own words round the questions, which stand in the order of the form. */
export function assemblePaper(title: string, content: ExamContent, questions: Question[]): PaperContent {
  return {
    title,
    cover: { instructionsHtml: textHtml(content.cover.instructions), declaration: content.cover.declaration.trim() },
    minutes: content.minutes,
    marks: questions.reduce((sum, question) => sum + question.marks, 0),
    materials: materialsSay(content.materials),
    passRule: passRuleSays(content),
    formulaSheetHtml: content.materials.formulaSheet && content.formulaSheet.trim() !== '' ? textHtml(content.formulaSheet) : null,
    sections: sectionsOf(content, questions),
    questions,
  };
}
