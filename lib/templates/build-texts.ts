import { blocksOf, formulasIn } from './blocks';
import type { Complaints } from './complaints';
import { formulaTrouble } from './html';
import { longest } from './model';
import type { TemplateText } from './parse';
import { placeholdersIn } from './placeholders';
import type { Path } from './yaml';

/** A placeholder must name what is printed: a given, a declared derived value, and in the solution a part. */
function checkPlaceholders(text: string, path: Path, template: TemplateText, complaints: Complaints, partsToo: boolean): void {
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

/** Complains of formulas that cannot be set; a value stands for each placeholder. */
function checkFormulas(text: string, path: Path, complaints: Complaints): void {
  for (const { tex } of formulasIn(blocksOf(text, () => ({ text: '1', tex: '1' })))) {
    const trouble = formulaTrouble(tex);
    if (trouble !== null) complaints.add('schema', `The formula ${tex.slice(0, 60)} cannot be set: ${trouble}.`, path);
  }
}

const checkLength = (text: string, limit: number, what: string, path: Path, complaints: Complaints): void => {
  if (text.length > limit) complaints.add('length', `The ${what} has ${text.length} characters, and ${limit} fit the paper: shorten it.`, path);
};

/** One printed text: it fits, its placeholders name something, its formulas can be set. */
export function checkText(text: string, limit: number, what: string, path: Path, template: TemplateText, complaints: Complaints): void {
  checkLength(text, limit, what, path, complaints);
  checkPlaceholders(text, path, template, complaints, what === 'solution');
  checkFormulas(text, path, complaints);
}

/** Checks title, stem, questions, labels and solution. */
export function checkTexts(template: TemplateText, complaints: Complaints): void {
  checkLength(template.title, longest.title, 'title', ['title'], complaints);
  checkText(template.stem, longest.stem, 'stem', ['stem'], template, complaints);
  checkText(template.solution, longest.solution, 'solution', ['solution'], template, complaints);
  template.parts.forEach((part, index) => checkText(part.ask, longest.ask, 'question', ['parts', index, 'ask'], template, complaints));
  for (const [name, derived] of Object.entries(template.derive))
    if (typeof derived !== 'string' && derived.label !== undefined) checkLength(derived.label, longest.label, 'label', ['derive', name, 'label'], complaints);
}
