import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { updateSceneSchema } from '../../../../shared/contracts/scene.ts';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { Dialog } from '../../components/ui/dialog.tsx';
import { Field } from '../../components/ui/field.tsx';
import { TextInput } from '../../components/ui/text-input.tsx';
import { formatBytes, formatCount } from '../../lib/format.ts';
import { formatCalendarDate } from '../../lib/format-date.ts';
import { type UploadLimits, checkCount, checkFile, joinFiles } from './check-files.ts';
import { ChosenFiles } from './chosen-files.tsx';
import { DropArea } from './drop-area.tsx';
import { namedDays, readAcquisitionDay, suggestSceneName } from './read-file-names.ts';
import type { SceneUpload } from './send-scene.ts';

interface UploadDialogProps {
  /** Files dropped on the page before the dialog opened. */
  firstFiles: readonly File[];
  limits: UploadLimits | null;
  onStart: (scene: SceneUpload) => void;
  onClose: () => void;
}

const FORM_ID = 'upload-scene';
const ACCEPT = '.tif,.tiff,.jp2,.j2k,.jpf,.jpx,image/tiff,image/jp2';
const formSchema = z.object({
  name: updateSceneSchema.shape.name.unwrap(),
  acquiredOn: z.union([z.literal('').transform(() => null), updateSceneSchema.shape.acquiredOn.unwrap()]),
});
type FormInput = z.input<typeof formSchema>;
type FormValues = z.output<typeof formSchema>;

const today = () => new Date().toISOString().slice(0, 10);

/** Name and date as the files' names say them. */
function wordsOf(files: readonly File[]): FormInput {
  const names = files.map(({ name }) => name);
  return { name: suggestSceneName(names), acquiredOn: readAcquisitionDay(names, today()) ?? '' };
}

/** Choosing the files of one scene and what is known of them; the upload itself goes on behind the page. */
export function UploadDialog({ firstFiles, limits, onStart, onClose }: UploadDialogProps) {
  const [files, setFiles] = useState<readonly File[]>(() => joinFiles([], firstFiles));
  const { register, handleSubmit, setValue, formState } = useForm<FormInput, unknown, FormValues>({
    resolver: zodResolver(formSchema),
    defaultValues: wordsOf(firstFiles),
  });
  const totalBytes = files.reduce((sum, { size }) => sum + size, 0);
  const countFault = checkCount(files.length, limits);
  const isRefused = countFault !== null || files.some((file) => checkFile(file, limits)?.kind === 'refusal');
  const days = namedDays(
    files.map(({ name }) => name),
    today(),
  );
  const choose = (next: readonly File[]) => {
    setFiles(next);
    const words = wordsOf(next);
    // What the person typed stays.
    if (!formState.dirtyFields.name) setValue('name', words.name, { shouldValidate: formState.isSubmitted });
    if (!formState.dirtyFields.acquiredOn) setValue('acquiredOn', words.acquiredOn);
  };
  const submit = handleSubmit((values) => {
    onStart({ ...values, files });
    onClose();
  });
  return (
    <Dialog
      isOpen
      onOpenChange={(isOpen) => !isOpen && onClose()}
      title="Upload a scene"
      description="All files of one scene together: one file with every band, or a file for each. Another date is a scene of its own."
      footer={
        <>
          <Button onClick={onClose}>Cancel</Button>
          <Button kind="strong" type="submit" form={FORM_ID} disabled={files.length === 0 || isRefused}>
            {files.length === 0
              ? 'Start upload'
              : `Upload ${formatCount(files.length, 'file')}, ${formatBytes(totalBytes)}`}
          </Button>
        </>
      }
    >
      <form id={FORM_ID} noValidate onSubmit={(event) => void submit(event)} className="flex flex-col gap-4">
        <DropArea
          buttonLabel={files.length === 0 ? 'Choose files…' : 'Add files…'}
          accept={ACCEPT}
          isMultiple
          onFiles={(added) => choose(joinFiles(files, added))}
        >
          Drop files here. GeoTIFF, COG or JPEG 2000, georeferenced and north-up
          {limits && `; up to ${formatBytes(limits.fileBytes)} a file`}. A coarser band, such as thermal, comes in a
          file of its own and keeps its pixels.
        </DropArea>
        {files.length > 0 && (
          <ChosenFiles files={files} limits={limits} onRemove={(file) => choose(files.filter((one) => one !== file))} />
        )}
        {countFault && (
          <Callout tone="danger" isAlert>
            {countFault}
          </Callout>
        )}
        {days.length > 1 && (
          <Callout tone="beware" title="More than one date.">
            The file names say {days.map(formatCalendarDate).join(' and ')}. Are they of one scene?
          </Callout>
        )}
        <div className="grid gap-4 sm:grid-cols-[1fr_11rem]">
          <Field label="Name" hint="As the team will know it" error={formState.errors.name?.message}>
            <TextInput autoComplete="off" {...register('name')} />
          </Field>
          <Field label="Acquired on" hint="Day of the overpass" isOptional error={formState.errors.acquiredOn?.message}>
            <TextInput type="date" max={today()} {...register('acquiredOn')} />
          </Field>
        </div>
      </form>
    </Dialog>
  );
}
