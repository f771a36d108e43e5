import type { InputHTMLAttributes, ReactNode } from "react";

type Props = InputHTMLAttributes<HTMLInputElement> & { label: ReactNode; hint?: string; problem?: string };

/** A labelled line of text with its hint and its problem; the problem is announced and tied to the field. */
export function TextField({ label, hint, problem, id, ...input }: Props) {
  const noteId = `${id}-note`;
  return (
    <div className="text-field">
      <label htmlFor={id}>{label}</label>
      <input {...input} id={id} className="text-input" aria-invalid={problem ? true : undefined} aria-describedby={problem || hint ? noteId : undefined} />
      {problem ? (
        <span className="problem" id={noteId} role="alert">
          {problem}
        </span>
      ) : hint ? (
        <span className="hint" id={noteId}>
          {hint}
        </span>
      ) : null}
    </div>
  );
}
