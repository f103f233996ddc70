/** What stands above the sheet: the project's note, and a conflict with another tab. */
import { useBench, useBenchStore, useProject } from '../state/react.ts';

export function Notices({ onTakeOther }: { onTakeOther: () => void }) {
  const { note } = useProject();
  const save = useBench((s) => s.save);
  const putNoteAway = useBench((s) => s.putNoteAway);
  return (
    <>
      {save.kind === 'elsewhere' && <Conflict onTakeOther={onTakeOther} />}
      {note !== '' && (
        <aside className="notice" aria-label="About this project">
          <p>{note}</p>
          <button type="button" className="plain" onClick={putNoteAway}>
            Put away
          </button>
        </aside>
      )}
    </>
  );
}

/** Both states are kept: this one becomes a project of its own, or gives way to the stored one (undo does not reach across). */
function Conflict({ onTakeOther }: { onTakeOther: () => void }) {
  const store = useBenchStore();
  return (
    <div className="notice conflict" role="alert">
      <p>
        Another tab has changed this project after this page was loaded, so this page is no longer saved. Nothing is
        lost yet: choose which state to go on with.
      </p>
      <button type="button" onClick={() => store.getState().keepAsCopy()}>
        Save this page as a copy
      </button>
      <button type="button" onClick={onTakeOther}>
        Show the other tab’s state
      </button>
    </div>
  );
}
