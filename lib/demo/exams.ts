import { approveExam, askForReview, newExam, saveExam } from '@/lib/exams/commands';
import type { ExamContent } from '@/lib/exams/model';
import { choosableVersions, examPage } from '@/lib/exams/queries';
import type { Company } from './people';
import { must } from './stage';

type Plan = { title: string; minutes: number; instructions: string; sections: { title: string; slugs: string[]; leastPercent: number | null }[] };

const formulaSheet = `
| quantity | formula |
| --- | --- |
| shunt motor | $I_a = I_L - I_f$, $I_f = V / R_f$ |
| back-EMF | $E = V - I_a R_a$ |
| generator | $E = V + I_a R_a$ |
| speed and flux | $n_2 / n_1 = (E_2 / E_1) \\, (\\Phi_1 / \\Phi_2)$ |
| power developed | $P = E I_a$ |
| torque | $T = P / \\omega$, $\\omega = 2 \\pi n / 60$ |
| speed regulation | $(n_0 - n_{fl}) / n_{fl} \\times 100\\,\\%$ |
`.trim();

/** What the demo's exams hold; slugs of the bank. */
export const plans = {
  machines: {
    title: 'Direct-current machines, period 2', minutes: 90, instructions: 'Write each answer with its unit. Carry at least four figures through a chain of steps and round at the end.\n\nCurrents are conventional currents.',
    sections: [
      { title: 'Motors', leastPercent: 50, slugs: ['shunt-back-emf', 'shunt-weakened-field', 'shunt-starting-resistance', 'motor-torque', 'series-back-emf'] },
      { title: 'Generators', leastPercent: null, slugs: ['shunt-generator-emf', 'generator-regulation', 'emf-speed-flux'] },
    ],
  },
  advanced: {
    title: 'Direct-current machines, period 3', minutes: 120, instructions: 'Write each answer with its unit.',
    sections: [
      { title: 'Motors', leastPercent: 50, slugs: ['compound-long-shunt-speed', 'shunt-dynamic-braking', 'graded-starter', 'separate-armature-voltage'] },
      { title: 'Generators', leastPercent: 50, slugs: ['compounding-diverter', 'compound-short-shunt-emf', 'shunt-generator-on-resistance'] },
    ],
  },
} satisfies Record<string, Plan>;

/** The author writes an exam; the second instructor approves it. Returns the frozen form. */
export async function makeForm({ author, reviewer }: Company, plan: Plan): Promise<string> {
  const versions = new Map(must(await choosableVersions(author), 'the approved templates').map((version) => [version.slug, version]));
  const { examId } = must(await newExam(author, { title: plan.title }), plan.title);
  const page = must(await examPage(author, examId), plan.title);
  const content: ExamContent = {
    ...page.content, minutes: plan.minutes, cover: { ...page.content.cover, instructions: plan.instructions }, formulaSheet,
    materials: { calculator: 'non-programmable', formulaSheet: true, codeBook: false, other: '' },
    passRule: { overallPercent: 70, rounding: 'tenth' },
    sections: plan.sections.map((section) => ({
      title: section.title, instructions: '', leastPercent: section.leastPercent,
      items: section.slugs.map((slug) => {
        const version = versions.get(slug);
        if (!version) throw new Error(`Demo: no approved template ${slug}.`);
        return { templateId: version.templateId, versionId: version.versionId };
      }),
    })),
  };
  const { revision } = must(await saveExam(author, examId, { title: plan.title, revision: page.revision, content }), `saving ${plan.title}`);
  must(await askForReview(author, examId, revision), `review of ${plan.title}`);
  const { formId } = must(await approveExam(reviewer, examId, { revision, note: '' }), `approval of ${plan.title}`);
  return formId;
}
