"use client";

import Link from "next/link";
import styles from "./run.module.css";

/** What, why, and two ways out. */
export function ScenarioBroken({ digest, onRetry }: { digest: string | undefined; onRetry: () => void }) {
  return (
    <div className={styles.broken} role="alert">
      <h1>This scenario could not be shown</h1>
      <p>
        Something broke on our side. Saved revisions are untouched, and changes that were not saved are kept in this
        browser.
      </p>
      {digest && <p className={styles.digest}>Reference {digest}</p>}
      <p className={styles.ways}>
        <button type="button" className="button" data-kind="primary" onClick={onRetry}>
          Try again
        </button>
        <Link className="button" href="/scenarios">
          Go to the scenarios
        </Link>
      </p>
    </div>
  );
}
