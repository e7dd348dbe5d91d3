import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import { MarkdownPreview } from './MarkdownPreview';
import { useSheet } from './fields';

/** Title, instructions and declaration: what a candidate reads before the clock runs. */
export function CoverFields() {
  const { register, watch, formState: { errors } } = useSheet();
  return (
    <section className="section" aria-labelledby="cover-head">
      <h2 id="cover-head">Cover page</h2>
      <div className="grid max-w-measure gap-5">
        <TextInput label="Title" error={errors.title?.message} {...register('title')} id="title" />
        <TextArea
          label="Instructions" optional rows={5} help="Paragraphs, lists, *emphasis* and $formulas$. Time, marks, materials and the pass rule are printed by themselves."
          error={errors.content?.cover?.instructions?.message} {...register('content.cover.instructions')} id="content.cover.instructions"
        />
        <MarkdownPreview label="The instructions as printed" text={watch('content.cover.instructions')} />
        <TextArea
          label="Declaration" optional rows={3} help="A candidate agrees to it before the first question is shown."
          error={errors.content?.cover?.declaration?.message} {...register('content.cover.declaration')} id="content.cover.declaration"
        />
      </div>
    </section>
  );
}
