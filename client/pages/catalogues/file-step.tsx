import { useId, useState, type DragEvent } from 'react';
import type { UploadedFile } from '../../../shared/schemas/file';
import { asProblem } from '../../api/problem-error';
import { Button } from '../../components/button';
import { buttonLook } from '../../components/button-look';
import { ProblemNotice } from '../../components/problem-notice';
import { formatBytes } from '../../components/quantities';
import { useUpload } from './use-catalogues';

/** Choosing or dropping a file, and its way to the server. */
export function FileStep({ group, onUploaded }: { group: string; onUploaded: (file: UploadedFile) => void }) {
  const id = useId();
  const [over, setOver] = useState(false);
  const upload = useUpload(group);
  const send = (file: File | undefined) => {
    if (file !== undefined) upload.mutate(file, { onSuccess: onUploaded });
  };
  const drop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    send(event.dataTransfer.files[0]);
  };
  const problem = upload.error === null ? null : asProblem(upload.error);
  return (
    <div className="grid gap-4">
      <div
        onDragOver={(event) => {
          event.preventDefault();
          setOver(true);
        }}
        onDragLeave={() => setOver(false)}
        onDrop={drop}
        className={`grid justify-items-center gap-3 rounded-sm border border-dashed p-8 text-center ${over ? 'border-accent bg-sunken' : 'border-edge'}`}
      >
        {upload.progress === null ? (
          <>
            <p>Drop a table here, or</p>
            <label htmlFor={id} className={`${buttonLook('main')} cursor-pointer focus-within:outline-2`}>
              Choose a file
              <input id={id} type="file" className="sr-only" onChange={(event) => send(event.target.files?.[0])} />
            </label>
            <p className="text-xs text-muted">.csv .tsv .txt .dat, also as .gz</p>
          </>
        ) : (
          <>
            <p>
              {formatBytes(upload.progress.sentBytes)} of {formatBytes(upload.progress.totalBytes)} sent
            </p>
            <progress
              aria-label="Upload"
              className="w-full max-w-md"
              value={upload.progress.sentBytes}
              max={Math.max(1, upload.progress.totalBytes)}
            />
            <Button size="sm" onClick={upload.stop}>
              Stop
            </Button>
          </>
        )}
      </div>
      {problem !== null && <ProblemNotice problem={problem} />}
    </div>
  );
}
