import Link from 'next/link';
import { EmptyState } from '@/components/ui/EmptyState';
import { LinkButton } from '@/components/ui/LinkButton';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { StateMark } from '@/components/ui/StateMark';
import type { OwnSitting } from '@/lib/candidates/model';
import type { SchoolSettings } from '@/lib/school/model';
import { showDay, showMoment, showShortDay, showTime, zoneName } from '@/lib/school/times';

type TodayProps = { now: Date; ahead: readonly OwnSitting[]; over: readonly OwnSitting[]; place: Pick<SchoolSettings, 'zone' | 'locale'> };

/** Whether the room's door can be open: check-in has begun, or the candidate sits already. */
const doorOpen = (sitting: OwnSitting): boolean => ['check-in', 'running', 'paused'].includes(sitting.sittingState);

function goWord(sitting: OwnSitting): string {
  return ['writing', 'paused', 'on rest break', 'admitted'].includes(sitting.state) ? 'Go to my paper' : 'Go to check-in';
}

function NextToSit({ sitting, place }: { sitting: OwnSitting; place: TodayProps['place'] }) {
  return (
    <section className="sheet next" aria-label={sitting.title}>
      <div className="next__top">
        <span className="cap">Next to sit</span>
        {sitting.sittingState === 'check-in' ? <StateMark thing="sitting" state="check-in">check-in open</StateMark> : <StateMark thing="sitting" state={sitting.sittingState as 'planned'} />}
      </div>
      <h2>{sitting.title}</h2>
      <p className="soft t15">{[`${sitting.minutesAllowed} minutes for you`, ...sitting.materials.map((line) => line.charAt(0).toLowerCase() + line.slice(1))].join(' · ')}</p>
      <RatingPlate
        kind="record" dense columns={2} label="Sitting"
        cells={[
          { label: 'Day', value: showShortDay(sitting.startsAt, place) },
          { label: 'Starts', value: showTime(sitting.startsAt, place) },
          { label: 'Room', value: sitting.room },
          { label: 'Seat', value: sitting.seat || 'any' },
        ]}
      />
      {/* A full navigation: the room is a page of its own, which the browser keeps for a reload without network. */}
      {doorOpen(sitting) ? (
        <a className="btn btn--main btn--lg" href={`/sit/${sitting.sittingId}`}>{goWord(sitting)}</a>
      ) : (
        <p className="t15">Check-in opens {showMoment(sitting.opensAt, place)}. {zoneName(sitting.startsAt, place)} counts.</p>
      )}
      <LinkButton size="exam" href="/rehearse">{sitting.rehearsed ? 'Rehearse again' : 'Rehearse on a dummy paper'}</LinkButton>
    </section>
  );
}

/** What a student has to sit next, what is further ahead, and what is over. */
export function TodaySheet({ now, ahead, over, place }: TodayProps) {
  const [next, ...later] = [...ahead].sort((a, b) => Number(doorOpen(b)) - Number(doorOpen(a)) || a.startsAt.getTime() - b.startsAt.getTime());
  return (
    <div className="today">
      <h1>Today</h1>
      <p className="soft t15">{showDay(now, place)}, {zoneName(now, place)}</p>
      {next ? <NextToSit sitting={next} place={place} /> : (
        <EmptyState title="Nothing to sit" says="Sittings of your classes stand here as soon as they are planned." />
      )}
      {later.length > 0 && (
        <>
          <h2 className="cap">Further ahead</h2>
          <ul className="rows">
            {later.map((sitting) => (
              <li key={sitting.sittingId}>
                <div>
                  <span><b>{sitting.title}</b><small>{showMoment(sitting.startsAt, place)} · room {sitting.room} · {sitting.minutesAllowed} minutes</small></span>
                  {doorOpen(sitting) ? <a className="btn" href={`/sit/${sitting.sittingId}`}>{goWord(sitting)}</a> : <StateMark thing="sitting" state={sitting.sittingState as 'planned'} small />}
                </div>
              </li>
            ))}
          </ul>
        </>
      )}
      {over.length > 0 && (
        <>
          <h2 className="cap">Over</h2>
          <ul className="rows">
            {over.map((sitting) => (
              <li key={sitting.sittingId}>
                <div>
                  <span><b>{sitting.title}</b><small>{sitting.endedAt ? `Ended ${showMoment(sitting.endedAt, place)}` : showMoment(sitting.startsAt, place)}</small></span>
                  <StateMark thing="candidate" state={sitting.state} small />
                </div>
              </li>
            ))}
          </ul>
          <p className="t15"><Link href="/results">My results</Link></p>
        </>
      )}
    </div>
  );
}
