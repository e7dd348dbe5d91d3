import { Histogram } from '@/components/figures/Histogram';
import { ShareBars } from '@/components/figures/ShareBars';
import { Button } from '@/components/ui/Button';
import { buttonClass, type ButtonLook } from '@/components/ui/button-class';
import { Caution } from '@/components/ui/Caution';
import { EmptyState } from '@/components/ui/EmptyState';
import { Key, Keys } from '@/components/ui/Keys';
import { LinkButton } from '@/components/ui/LinkButton';
import { MathText } from '@/components/ui/MathText';
import { Notice } from '@/components/ui/Notice';
import { Pairs } from '@/components/ui/Pairs';
import { Progress } from '@/components/ui/Progress';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { LedgerSkeleton } from '@/components/ui/Skeleton';
import { StateMark } from '@/components/ui/StateMark';
import { states, type StateOf, type Thing } from '@/components/ui/states';
import { Tally } from '@/components/ui/Tally';
import { Timeline } from '@/components/ui/Timeline';
import { Section } from './Section';

const looks: ButtonLook[] = ['main', 'plain', 'quiet', 'stop', 'stop-main'];
const bins = [4, 11, 38, 120, 260, 410, 480, 350, 204, 86, 30, 7].map((count, at) => ({ from: 60 + at * 5, to: 65 + at * 5, count }));

export function ButtonParts() {
  return (
    <Section title="Button" says="rest, busy, off">
      {looks.map((look) => (
        <div className="btn-row" key={look}>
          <Button look={look}>Release results</Button>
          <Button look={look} busy>
            Release results
          </Button>
          <Button look={look} disabled>
            Release results
          </Button>
        </div>
      ))}
      <div className="btn-row">
        <Button size="exam">48 exam</Button>
        <Button size="touch">44 touch</Button>
        <Button>40</Button>
        <Button size="dense">32 dense</Button>
        <Button aria-pressed shape="flag">
          Flagged
        </Button>
        <LinkButton href="/parts" look="main">
          A link
        </LinkButton>
        <a className={buttonClass('quiet')} href="#main">
          Another
        </a>
        <span className="need">+25 %</span>
        <Key>Ctrl K</Key>
      </div>
    </Section>
  );
}

function StatesOf<T extends Thing>({ thing }: { thing: T }) {
  return (
    <div>
      <p className="cap mb-2 border-b border-ink pb-2">{thing}</p>
      <ul className="grid gap-2">
        {(Object.keys(states[thing]) as StateOf<T>[]).map((state) => (
          <li key={state}>
            <StateMark thing={thing} state={state} />
          </li>
        ))}
      </ul>
    </div>
  );
}

export function StateParts() {
  return (
    <Section title="StateMark" says="shape, word and colour, always the three">
      <div className="grid grid-cols-2 gap-6 md:grid-cols-3 lg:grid-cols-5">
        {(Object.keys(states) as Thing[]).map((thing) => (
          <StatesOf key={thing} thing={thing} />
        ))}
      </div>
    </Section>
  );
}

export function PlateParts() {
  return (
    <Section title="RatingPlate">
      <RatingPlate
        label="Given values"
        kind="drawn"
        cells={[
          { label: 'Supply voltage', symbol: 'V', value: '250', unit: 'V' },
          { label: 'Line current', symbol: 'I_L', value: '62', unit: 'A' },
          { label: 'Armature circuit', symbol: 'R_a', value: '0.14', unit: 'Ω' },
          { label: 'Field circuit', symbol: 'R_f', value: '125', unit: 'Ω' },
          { label: 'Full-field speed', symbol: 'n_1', value: '1150', unit: 'r/min' },
        ]}
      />
      <RatingPlate
        label="Machine"
        dense
        columns={4}
        cells={[
          { label: 'Output', symbol: 'P', value: '50', unit: 'hp' },
          { label: 'Voltage', symbol: 'V', value: '250', unit: 'V' },
          { label: 'Current', symbol: 'I', value: '167', unit: 'A' },
          { label: 'Speed', symbol: 'n', value: '1150', unit: 'r/min' },
        ]}
      />
      <RatingPlate
        label="Candidate"
        kind="record"
        dense
        cells={[
          { label: 'Candidate', value: 'O. T. Vance' },
          { label: 'Number', value: 'KR-20420' },
          { label: 'Seat', value: 'C4' },
        ]}
      />
    </Section>
  );
}

export function NoteParts() {
  return (
    <Section title="Notice, caution" says="where the matter is; no toasts">
      <Notice
        kind="ok"
        title="Released."
        action={
          <Button look="quiet" size="dense">
            Open
          </Button>
        }
      >
        23 students can read their marked papers.
      </Notice>
      <Notice kind="info" title="Erratum to question 7.">
        Read “field circuit”, not “field coil”.
      </Notice>
      <Notice kind="wait" title="One row left out.">
        Line 14: the learner number is already taken.
      </Notice>
      <Notice kind="stop" title="The draw gave a negative armature current in 14 of 2,000 draws.">
        Narrow V or raise Rf.
      </Notice>
      <Caution title="Never open the field of a running motor to try this.">
        A turning machine is a generator and its terminals are live. For supervised training only; local codes, the maker’s instructions and
        a licensed electrician decide.
      </Caution>
      <EmptyState title="No sittings this term" says="Approve an exam first, then schedule it for a class.">
        <LinkButton href="/parts">Go to Exams</LinkButton>
      </EmptyState>
    </Section>
  );
}

export function FactParts({ formula }: { formula: string }) {
  return (
    <Section title="Facts and figures">
      <MathText html={formula} />
      <Tally
        label="Candidates"
        counts={[
          { key: 'writing', count: 18, mark: <StateMark thing="candidate" state="writing" /> },
          { key: 'rest', count: 1, mark: <StateMark thing="candidate" state="on rest break" /> },
          { key: 'lost', count: 1, mark: <StateMark thing="signal" state="lost contact" /> },
        ]}
        end={{ figure: '1:12:40', says: 'left in the room' }}
      />
      <div className="grid gap-6 md:grid-cols-2">
        <Pairs
          pairs={[
            { label: 'Learner number', value: <span className="num">KR-20417</span> },
            { label: 'Saved', value: '6 of 12, last at 10:10:12' },
          ]}
        />
        <Timeline
          entries={[
            { key: '1', at: '10:10', machine: '2025-11-20T10:10', says: 'Last heard from tablet 9' },
            { key: '2', at: '09:25', machine: '2025-11-20T09:25', says: 'Started with the room' },
          ]}
        />
      </div>
      <Progress
        label="Check"
        done={1240}
        of={2000}
        unit="draws"
        says={<StateMark thing="check" state="running" />}
        cancel={
          <Button look="quiet" size="dense">
            Cancel the check
          </Button>
        }
      />
      <Histogram title="Key of part a over 2,000 draws" unit="A" counted="Draws" bins={bins} marks={[{ at: 92, label: 'this draw' }]} />
      <ShareBars
        label="Marks by area"
        shares={[
          { label: 'DC motors', share: 0.86, says: '34.5 of 40' },
          { label: 'DC generators', share: 0.43, says: '13.0 of 30', low: true },
        ]}
      />
      <Keys
        keys={[
          { press: ['↑', '↓'], does: 'move among rows' },
          { press: ['/'], does: 'go to the filter' },
        ]}
      />
      <LedgerSkeleton rows={3} />
    </Section>
  );
}
