'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { LinkButton } from '@/components/ui/LinkButton';
import { Select } from '@/components/ui/Select';
import { TextInput } from '@/components/ui/TextInput';
import { newTemplateInput, type NewTemplateForm as Fields, type NewTemplateInput, slugOf } from '@/lib/bank/model';
import type { Result } from '@/lib/result';

type Named = { name: string; title: string };
type Props = { areas: readonly Named[]; cautions: readonly Named[]; make: (input: NewTemplateInput) => Promise<Result<{ slug: string }>> };
const optionsOf = (rows: readonly Named[]) => rows.map(({ name, title }) => ({ value: name, label: title }));
const levels = ['1', '2', '3', '4', '5', '6', '7', '8', '9'].map((level) => ({ value: level, label: level }));

/** Names a new template; the slug follows the title until it is typed by hand. */
export function NewTemplateForm({ areas, cautions, make }: Props) {
  const router = useRouter();
  const [refused, setRefused] = useState<{ says: string; field?: string } | null>(null);
  const form = useForm<Fields, unknown, NewTemplateInput>({ resolver: zodResolver(newTemplateInput), defaultValues: { title: '', slug: '', area: areas[0]?.name ?? '', level: '1', caution: '' } });
  const { errors, submitCount, isSubmitting, dirtyFields } = form.formState;
  const submit = form.handleSubmit(async (input) => {
    const result = await make(input).catch(() => null);
    if (result?.ok) router.push(`/bank/${result.value.slug}`);
    else setRefused(result ?? { says: 'The server did not answer. What you typed is still here: try again in a moment.' });
  });
  const says = (field: keyof Fields) => errors[field]?.message ?? (refused?.field === field ? refused.says : undefined);
  const fields = ['title', 'slug', 'area', 'level', 'caution'] as const;
  const known = fields.flatMap((field) => (says(field) ? [{ field, says: says(field) ?? '' }] : []));
  const all = refused && !fields.some((field) => field === refused.field) ? [...known, { says: refused.says }] : known;
  const title = form.register('title', { onChange: (event: { target: { value: string } }) => dirtyFields.slug || form.setValue('slug', slugOf(event.target.value)) });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-measure gap-5">
      <ErrorSummary errors={all} attempt={submitCount} />
      <TextInput label="Title" help="What it examines, as a teacher would say it." error={says('title')} {...title} id="title" />
      <TextInput label="Slug" help="Its name in addresses and files; it stays once the template was reviewed." error={says('slug')} {...form.register('slug')} id="slug" />
      <Select label="Area" error={says('area')} options={optionsOf(areas)} {...form.register('area')} id="area" />
      <Select label="Level" help="The period of training it belongs to." error={says('level')} options={levels} {...form.register('level')} id="level" />
      <Select label="Caution" help="Printed with the question and its solution. Areas with dangerous work demand one." error={says('caution')} options={[{ value: '', label: 'None' }, ...optionsOf(cautions)]} {...form.register('caution')} id="caution" />
      <div className="btn-row">
        <Button type="submit" look="main" busy={isSubmitting}>Make the template</Button>
        <LinkButton href="/bank">Go back</LinkButton>
      </div>
    </form>
  );
}
