/** The note being written: what is typed, what is saved, what the server said. */
import { useCallback, useEffect, useRef, useState } from 'react';
import type { FaultDetail } from '@/contracts/faults';
import { emptyBody } from '@/domain/faults/body';
import { offeredFaultSteps, type FaultStep } from '@/domain/faults/states';
import { createNote, saveNote, takeStep, type Answered } from './calls';
import { forget, keep, keyOf, readKept } from './keep';
import type { Draft, EditorProps, Wrong } from './types';

const KEEP_AFTER_MS = 800;

export const draftOf = (note: FaultDetail): Draft => ({
  title: note.title,
  boardId: note.board?.id ?? null,
  partKind: note.partKind,
  incident: note.incident,
  symptoms: note.symptoms,
  body: note.body,
});

const firstDraft = ({ note, ticket }: EditorProps): Draft =>
  note
    ? draftOf(note)
    : {
        title: '',
        boardId: ticket?.boardId ?? null,
        partKind: null,
        incident: ticket?.incident ?? null,
        symptoms: ticket?.symptoms ?? [],
        body: emptyBody(),
      };

const same = (a: Draft, b: Draft) => JSON.stringify(a) === JSON.stringify(b);

export type Status = 'saved' | 'unsaved' | 'saving' | 'moving' | 'refused';

export function useNote(props: EditorProps) {
  const { ticket, person } = props;
  const [note, setNote] = useState(props.note);
  const key = keyOf(person, note?.id ?? null, ticket?.number ?? null);
  // What was kept from an earlier sitting comes back at once; its version says what it was made from.
  const [restored, setRestored] = useState(() => {
    const kept = readKept(key, Date.now());
    return kept && !same(kept.draft, firstDraft(props)) ? kept : null;
  });
  const [draft, setDraft] = useState<Draft>(restored?.draft ?? firstDraft(props));
  const [base, setBase] = useState(restored?.version ?? props.note?.version ?? 0);
  const [saved, setSaved] = useState<Draft>(() => firstDraft(props));
  const [status, setStatus] = useState<Status>(restored ? 'unsaved' : 'saved');
  const [wrong, setWrong] = useState<Wrong>({});
  const [reason, setReason] = useState('');
  const [theirs, setTheirs] = useState<FaultDetail | null>(null);
  const [keeps, setKeeps] = useState(true);
  const attempt = useRef({ text: '', key: '' });
  const dirty = !same(draft, saved);

  useEffect(() => {
    if (!dirty) return;
    const timer = setTimeout(
      () => setKeeps(keep(key, { draft, version: base, at: Date.now() })),
      KEEP_AFTER_MS,
    );
    return () => clearTimeout(timer);
  }, [draft, dirty, key, base]);

  useEffect(() => {
    if (!dirty) return;
    const stay = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', stay);
    return () => window.removeEventListener('beforeunload', stay);
  }, [dirty]);

  const change = useCallback((part: (now: Draft) => Draft) => {
    setDraft(part);
    setStatus((now) => (now === 'saving' || now === 'moving' ? now : 'unsaved'));
  }, []);

  const refused = (answer: Extract<Answered<unknown>, { ok: false }>) => {
    setStatus('refused');
    setReason(answer.reason);
    setWrong(answer.wrong);
    if (answer.status === 412 && answer.current) setTheirs(answer.current);
  };

  const send = (now: Draft, version: number): Promise<Answered<FaultDetail>> => {
    if (note) return saveNote(note.id, version, now);
    // The same text sent again after a broken line is the same note.
    const text = JSON.stringify(now);
    if (attempt.current.text !== text) attempt.current = { text, key: crypto.randomUUID() };
    return createNote(now, ticket?.number ?? null, attempt.current.key);
  };

  /** Saves what is typed; answers the saved note, or null when it was refused. */
  const save = async (version = base): Promise<FaultDetail | null> => {
    const sent = draft;
    setStatus('saving');
    setReason('');
    setWrong({});
    const answer = await send(sent, version);
    if (!answer.ok) {
      refused(answer);
      return null;
    }
    forget(key);
    if (!note) window.history.replaceState(null, '', `/faults/${answer.value.id}/edit`);
    setNote(answer.value);
    setBase(answer.value.version);
    setSaved(sent);
    setTheirs(null);
    setRestored(null);
    setStatus('saved');
    return answer.value;
  };

  /** Saves first when something was typed, then takes the step and goes to the note. */
  const move = async (step: FaultStep): Promise<void> => {
    const current = dirty || !note ? await save() : note;
    if (!current) return;
    setStatus('moving');
    const answer = await takeStep(current.id, current.version, step);
    if (answer.ok) window.location.assign(`/faults/${current.id}`);
    else refused(answer);
  };

  /** Takes what the server has instead of what is typed. */
  const takeOver = (from: FaultDetail) => {
    forget(key);
    setNote(from);
    setBase(from.version);
    setDraft(draftOf(from));
    setSaved(draftOf(from));
    setTheirs(null);
    setRestored(null);
    setReason('');
    setWrong({});
    setStatus('saved');
  };

  const throwAway = () => {
    forget(key);
    if (note) takeOver(note);
    else {
      setDraft(firstDraft(props));
      setRestored(null);
      setStatus('saved');
    }
  };

  // A new draft may be moved as soon as it is saved: the steps of a draft are known.
  const steps =
    note?.steps ??
    offeredFaultSteps(
      { state: 'draft', own: true, correction: false },
      props.canPublish ? 'senior' : 'technician',
    );
  const correcting = note?.state === 'published';
  const offered = steps.filter((s) => s.note === null && s.step !== 'drop');
  if (correcting && dirty && !offered.some((s) => s.step === 'publish'))
    offered.push({ step: 'publish', label: 'Publish the correction', note: null });

  return {
    note,
    draft,
    change,
    dirty,
    status,
    reason,
    wrong,
    theirs,
    restored,
    keeps,
    offered,
    save,
    move,
    takeOver,
    throwAway,
  };
}
