import type { PaperContent } from '@/lib/exams/paper';
import type { Question } from '@/lib/templates/question';

const value = (text: string): string => `<span class="drawn">${text}</span>`;

const questions: Question[] = [
  {
    marks: 2, minutes: 2, conventions: [], cautions: [],
    plate: [{ label: 'Supply voltage', symbol: 'V', value: '240', unit: 'V' }, { label: 'Resistance', symbol: 'R', value: '48.0', unit: 'Ω' }],
    stemHtml: `<p>A heater of ${value('48.0 Ω')} stands on ${value('240 V')}. Write an answer with its unit and look at what it reads as: try <em>5 A</em>, then <em>5000 mA</em>.</p>`,
    parts: [{ part: 'a', kind: 'number', askHtml: 'Find the current.', marks: 1, working: false, unit: 'A' }, { part: 'b', kind: 'number', askHtml: 'Find the power.', marks: 1, working: false, unit: 'W' }],
  },
  {
    marks: 1, minutes: 1, conventions: [], cautions: [], plate: [],
    stemHtml: '<p>Take an option, take it back, take another. Flag this question and find it again in the row above.</p>',
    parts: [{
      part: 'a', kind: 'choice', askHtml: 'What does an ammeter in series with the heater show?', marks: 1, working: false,
      options: [{ option: 'A', html: 'the current' }, { option: 'B', html: 'the voltage' }, { option: 'C', html: 'the power' }],
    }],
  },
];

/** The dummy paper that everybody rehearses on: no exam uses it, and nothing of it is marked or sent. */
export const rehearsalPaper: PaperContent = {
  title: 'Rehearsal', cover: { instructionsHtml: '', declaration: '' }, minutes: 20, marks: 3, materials: [], passRule: [],
  formulaSheetHtml: '<p>In a sitting the formula sheet of the exam stands here, where there is one.</p>',
  sections: [{ title: 'Rehearsal', instructionsHtml: '', first: 1, last: 2, marks: 3 }], questions,
};

export type DeviceCheck = { key: string; label: string; ok: boolean; says: string };

/** What this browser can do for a sitting, each in words. `serverNow`: the server's time when the page was made [ms]. */
export async function checkDevice(serverNow: number, sinceMade: number): Promise<DeviceCheck[]> {
  const apart = Math.round((Date.now() - sinceMade - serverNow) / 1000);
  const storage = await canStore();
  const secure = isSecureContext && 'serviceWorker' in navigator;
  return [
    { key: 'storage', label: 'Answers kept on this device', ok: storage, says: storage ? 'A reload or a lost network loses nothing.' : 'This browser keeps nothing (a private window?). Use an ordinary window.' },
    { key: 'offline', label: 'Reload without network', ok: secure, says: secure ? 'The room opens again without network.' : 'Only over a secure address. The room works, but do not reload while the network is down.' },
    { key: 'clock', label: 'Clock of this device', ok: true, says: Math.abs(apart) < 120 ? 'Agrees with the server.' : `Is ${Math.round(Math.abs(apart) / 60)} minutes ${apart > 0 ? 'ahead' : 'behind'}. It changes nothing: only the server’s clock counts.` },
    { key: 'width', label: 'Screen', ok: innerWidth >= 320, says: `${innerWidth} by ${innerHeight} points.` },
  ];
}

async function canStore(): Promise<boolean> {
  return new Promise((resolve) => {
    try {
      const request = indexedDB.open('fullfield-rehearsal', 1);
      request.onsuccess = () => {
        request.result.close();
        indexedDB.deleteDatabase('fullfield-rehearsal');
        resolve(true);
      };
      request.onerror = () => resolve(false);
    } catch {
      resolve(false);
    }
  });
}
