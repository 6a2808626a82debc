import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { TextField } from '../../components/text-field';
import { useMerge } from './use-objects';

/** Asks before objects are merged by hand, and says what will change. */
export function MergeDialog({
  group,
  numbers,
  open,
  onClose,
  onMerged,
}: {
  group: string;
  numbers: readonly number[];
  open: boolean;
  onClose: () => void;
  onMerged: () => void;
}) {
  const navigate = useNavigate();
  const merge = useMerge(group);
  const [remark, setRemark] = useState('');
  const [lowest, ...others] = numbers;
  return (
    <ConfirmDialog
      open={open}
      onClose={onClose}
      kind="main"
      title={`Merge ${numbers.length} objects?`}
      confirmLabel="Merge"
      busy={merge.isPending}
      problem={merge.error}
      onConfirm={() =>
        merge.mutate(
          { numbers: [...numbers], remark },
          {
            onSuccess: () => {
              onMerged();
              onClose();
              void navigate(`/g/${group}/objects/${lowest ?? ''}`);
            },
          },
        )
      }
    >
      <div className="grid gap-3">
        <p>
          {others.length} “same” {others.length === 1 ? 'verdict is' : 'verdicts are'} written in your name. The merged object
          goes by #{lowest}; {others.map((number) => `#${number}`).join(', ')} will forward to it. Taking the verdicts back
          restores every number.
        </p>
        <TextField label="Why" value={remark} onChange={(event) => setRemark(event.target.value)} />
      </div>
    </ConfirmDialog>
  );
}
