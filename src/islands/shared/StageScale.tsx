/** A ticket's way through the shop: graduations are the stages, the needle stands where the ticket is. */
import { StageMark } from './StageMark';

export interface Moment {
  /** Exact instant, ISO 8601. */
  readonly iso: string;
  /** As the shop's clock writes it. */
  readonly text: string;
}

export interface Stage {
  readonly key: string;
  readonly label: string;
  /** When the ticket reached it; left out for what is to come or was skipped. */
  readonly at?: Moment | undefined;
}

export interface SideExit {
  readonly label: string;
  /** The stage it left the line at. */
  readonly after: string;
  readonly at?: Moment | undefined;
  /** Waiting comes back to the line; an end does not. */
  readonly kind: 'wait' | 'end';
}

/**
 * Horizontal where there is room, a vertical list where there is not; the same list either way. With `exit` the needle
 * stands on the branch that leaves the line after `exit.after`.
 */
export function StageScale({
  stages,
  current,
  exit,
}: {
  stages: readonly Stage[];
  /** Key of the stage the ticket is at, or was at when it left by the exit. */
  current: string;
  exit?: SideExit | undefined;
}) {
  const reached = stages.findIndex(({ key }) => key === (exit?.after ?? current));
  const now = exit?.label ?? stages[reached]?.label ?? 'not known';
  const count = exit ? '' : `, ${reached + 1} of ${stages.length}`;
  return (
    <figure className="stages-frame" aria-label={`Stage: ${now}${count}`}>
      <ol className="stages">
        {stages.flatMap((stage, i) => {
          const here = i === reached && !exit;
          const line = i < reached ? 'passed' : i === reached ? 'reached' : 'ahead';
          const mark = (
            <li
              key={stage.key}
              className={`stage stage-${line}${here ? ' stage-here' : ''}`}
              aria-current={here ? 'step' : undefined}
            >
              <StageMark line={line} needle={here} first={i === 0} last={i === stages.length - 1} />
              <Words label={stage.label} at={stage.at} />
            </li>
          );
          if (!exit || i !== reached) return [mark];
          return [
            mark,
            <li
              key="exit"
              className={`stage stage-exit stage-${exit.kind} stage-here`}
              aria-current="step"
            >
              <StageMark line="exit" needle last={i === stages.length - 1} />
              <Words label={exit.label} at={exit.at} />
            </li>,
          ];
        })}
      </ol>
    </figure>
  );
}

function Words({ label, at }: { label: string; at?: Moment | undefined }) {
  return (
    <span className="stage-words">
      <span className="stage-name">{label}</span>
      {at && <time dateTime={at.iso}>{at.text}</time>}
    </span>
  );
}
