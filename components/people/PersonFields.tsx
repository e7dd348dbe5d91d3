'use client';

import type { FieldValues, Path, UseFormRegister } from 'react-hook-form';
import { Checkbox } from '@/components/ui/Checkbox';
import { FieldGroup } from '@/components/ui/Field';
import { TextInput } from '@/components/ui/TextInput';
import { roles } from '@/lib/context';

type FieldsOf<Fields extends FieldValues> = { register: UseFormRegister<Fields>; says: (field: Path<Fields>) => string | undefined };

const roleSays = {
  instructor: 'Instructor: writes, schedules, marks',
  student: 'Student: sits exams',
  proctor: 'Proctor: runs sittings in the room',
  registrar: 'Registrar: people, results, settings',
} as const;

/** Name, sort name, learner number and e-mail. */
export function ParticularsFields<Fields extends FieldValues & { name: string; sortName: string; email: string; learnerNumber: string }>({ register, says }: FieldsOf<Fields>) {
  const field = (name: string) => ({ ...register(name as Path<Fields>), id: name, error: says(name as Path<Fields>) });
  return (
    <>
      <TextInput label="Name" help="As the person writes it. One word is enough." autoComplete="off" {...field('name')} />
      <TextInput label="Sorted as" optional help="Made from the name when left empty: the last word comes first." autoComplete="off" {...field('sortName')} />
      <TextInput label="Learner number" optional autoComplete="off" {...field('learnerNumber')} />
      <TextInput label="E-mail" optional help="For invitations, reports and a forgotten password. Without one, print slips." type="email" autoComplete="off" {...field('email')} />
    </>
  );
}

/** The roles somebody holds; several may be. */
export function RolesFields<Fields extends FieldValues & { roles: string[] }>({ register, says }: FieldsOf<Fields>) {
  return (
    <FieldGroup label="Roles" error={says('roles' as Path<Fields>)}>
      {roles.map((role) => (
        <Checkbox key={role} label={roleSays[role]} value={role} {...register('roles' as Path<Fields>)} />
      ))}
    </FieldGroup>
  );
}
