import type { Complaints } from './complaints';
import { longest } from './model';
import type { TemplateText } from './parse';
import { placeholdersIn } from './placeholders';
import type { Path } from './yaml';

/** A placeholder must name what is printed: a given, a declared derived value, and in the solution a part. */
export function checkPlaceholders(text: string, path: Path, template: TemplateText, complaints: Complaints, partsToo: boolean): void {
  for (const name of placeholdersIn(text)) {
    const complain = (says: string) => complaints.add('placeholder', says, path);
    if (name.startsWith('part.')) {
      const id = name.slice('part.'.length);
      if (!template.parts.some(({ part }) => part === id)) complain(`{{${name}}} names a part that is not there.`);
      else if (!partsToo) complain(`{{${name}}} would print a key before the answer: parts are printed in the solution only.`);
    } else if (Object.hasOwn(template.given, name)) {
      continue;
    } else if (Object.hasOwn(template.derive, name)) {
      if (typeof template.derive[name] === 'string') complain(`{{${name}}} prints a derived value that is not declared: write ${name}: { key: …, unit: …, decimals: … }.`);
    } else {
      complain(`{{${name}}} names nothing that is given or derived here.`);
    }
  }
}

const checkLength = (text: string, limit: number, what: string, path: Path, complaints: Complaints): void => {
  if (text.length > limit) complaints.add('length', `The ${what} has ${text.length} characters, and ${limit} fit the paper: shorten it.`, path);
};

/** Checks length and placeholders of title, stem, questions, labels and solution. */
export function checkTexts(template: TemplateText, complaints: Complaints): void {
  checkLength(template.title, longest.title, 'title', ['title'], complaints);
  checkLength(template.stem, longest.stem, 'stem', ['stem'], complaints);
  checkLength(template.solution, longest.solution, 'solution', ['solution'], complaints);
  checkPlaceholders(template.stem, ['stem'], template, complaints, false);
  checkPlaceholders(template.solution, ['solution'], template, complaints, true);
  template.parts.forEach((part, index) => {
    checkLength(part.ask, longest.ask, 'question', ['parts', index, 'ask'], complaints);
    checkPlaceholders(part.ask, ['parts', index, 'ask'], template, complaints, false);
  });
  for (const [name, derived] of Object.entries(template.derive))
    if (typeof derived !== 'string' && derived.label !== undefined) checkLength(derived.label, longest.label, 'label', ['derive', name, 'label'], complaints);
}
