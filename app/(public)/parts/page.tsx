import katex from 'katex';
import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { DialogParts, FormParts } from '@/components/parts/FormParts';
import { LedgerParts } from '@/components/parts/LedgerParts';
import { RoomParts, SeatParts } from '@/components/parts/RoomParts';
import { ButtonParts, FactParts, NoteParts, PlateParts, StateParts } from '@/components/parts/StillParts';
import { StaffShell } from '@/components/shell/StaffShell';
import { Button } from '@/components/ui/Button';
import { PageHead } from '@/components/ui/PageHead';
import { config } from '@/lib/config';

export const metadata: Metadata = { title: 'Parts' };

const places = ['Bank', 'Exams', 'Sittings', 'Marking', 'Records', 'People'].map((label) => ({ href: label === 'Bank' ? '/parts' : `/${label.toLowerCase()}`, label }));

/** Every part in its states, for whoever builds screens and for the tests; a school's installation has no such page. */
export default function Parts() {
  if (config().kind === 'school') notFound();
  const formula = `<p>Rotor speed on a weakened field: ${katex.renderToString('n_2 = n_1\\,\\frac{E_2}{E_1}\\cdot\\frac{\\Phi_1}{\\Phi_2}', { output: 'htmlAndMathml', trust: false })} Ω µ π φ θ √ ≤ ≥ ≈ ± − × °</p>`;
  return (
    <StaffShell
      school="Kettle Ridge Trades College"
      places={places}
      account={{ name: 'I. Marchetti', role: 'instructor' }}
      signOut={
        <form>
          <Button type="submit">Sign out</Button>
        </form>
      }
    >
      <PageHead title="Parts" says="Every part of the screens in its states.">
        <Button>Bring in files</Button>
        <Button look="main">New template</Button>
      </PageHead>
      <ButtonParts />
      <StateParts />
      <PlateParts />
      <FormParts />
      <DialogParts />
      <RoomParts />
      <SeatParts />
      <LedgerParts />
      <NoteParts />
      <FactParts formula={formula} />
    </StaffShell>
  );
}
