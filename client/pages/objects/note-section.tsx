import { useState } from 'react';
import type { Note, ObjectDetail } from '../../../shared/schemas/object';
import { useSession } from '../../api/session';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { Markdown } from '../../components/markdown';
import { ProblemNotice } from '../../components/problem-notice';
import { RelativeTime } from '../../components/relative-time';
import { Section } from '../../components/section';
import { TextAreaField } from '../../components/text-area-field';
import { useObjectChanges } from './use-objects';

/** What people wrote about the object. */
export function NoteSection({ group, object }: { group: string; object: ObjectDetail }) {
  const { can } = useGroup();
  const { addNote } = useObjectChanges(group, object.number);
  const [body, setBody] = useState('');
  return (
    <Section title="Notes">
      <div className="grid gap-4">
        {object.notes.length === 0 && <p className="text-muted">No note yet.</p>}
        {object.notes.map((note) => (
          <NoteView key={note.id} group={group} number={object.number} note={note} />
        ))}
        {can('contributor') && (
          <form
            className="screen-only grid gap-3"
            onSubmit={(event) => {
              event.preventDefault();
              addNote.mutate(body, { onSuccess: () => setBody('') });
            }}
          >
            <TextAreaField
              label="Write a note"
              hint="Markdown: *emphasis*, **strong**, `code`, lists, links."
              value={body}
              onChange={(event) => setBody(event.target.value)}
            />
            {addNote.error !== null && <ProblemNotice problem={addNote.error} />}
            <div>
              <Button type="submit" kind="main" busy={addNote.isPending} disabled={body.trim() === ''}>
                Keep the note
              </Button>
            </div>
          </form>
        )}
      </div>
    </Section>
  );
}

function NoteView({ group, number, note }: { group: string; number: number; note: Note }) {
  const { can } = useGroup();
  const me = useSession().person?.id;
  const { editNote, deleteNote } = useObjectChanges(group, number);
  const [draft, setDraft] = useState<string | null>(null);
  const [deleting, setDeleting] = useState(false);
  const mayChange = can('curator') || (can('contributor') && note.personId === me);
  return (
    <article className="grid gap-2 border-l-2 border-rule pl-4">
      {draft === null ? (
        <Markdown text={note.body} />
      ) : (
        <form
          className="grid gap-3"
          onSubmit={(event) => {
            event.preventDefault();
            editNote.mutate({ noteId: note.id, body: draft }, { onSuccess: () => setDraft(null) });
          }}
        >
          <TextAreaField label="Change the note" value={draft} onChange={(event) => setDraft(event.target.value)} />
          {editNote.error !== null && <ProblemNotice problem={editNote.error} />}
          <div className="flex gap-2">
            <Button type="submit" kind="main" size="sm" busy={editNote.isPending} disabled={draft.trim() === ''}>
              Keep
            </Button>
            <Button size="sm" onClick={() => setDraft(null)}>
              Leave it as it was
            </Button>
          </div>
        </form>
      )}
      <p className="flex flex-wrap items-center gap-x-3 text-xs text-muted">
        {note.by}, <RelativeTime at={note.at} />
        {note.editedAt !== null && (
          <>
            , changed <RelativeTime at={note.editedAt} />
          </>
        )}
        {note.writtenOn !== number && <span>written on #{note.writtenOn}</span>}
        {mayChange && draft === null && (
          <span className="screen-only flex gap-1">
            <Button size="sm" kind="quiet" onClick={() => setDraft(note.body)}>
              Change
            </Button>
            <Button size="sm" kind="quiet" onClick={() => setDeleting(true)}>
              Delete
            </Button>
          </span>
        )}
      </p>
      <ConfirmDialog
        open={deleting}
        onClose={() => setDeleting(false)}
        title="Delete this note?"
        confirmLabel="Delete"
        busy={deleteNote.isPending}
        problem={deleteNote.error}
        onConfirm={() => deleteNote.mutate(note.id, { onSuccess: () => setDeleting(false) })}
      >
        One note goes out of sight; the audit trail keeps that it was there.
      </ConfirmDialog>
    </article>
  );
}
