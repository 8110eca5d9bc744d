/** Things to undo when a run ends, whether it ends well, in an error or by a signal. */
export interface Scope {
  /** @param undo must not throw and must not wait: a signal leaves no time. @returns a function that forgets it. */
  readonly add: (undo: () => void) => () => void;
  /** Undoes everything, the latest first; a second call does nothing. */
  readonly close: () => void;
}

export function openScope(): Scope {
  const pending: (() => void)[] = [];
  return {
    add(undo) {
      pending.push(undo);
      return () => {
        const at = pending.indexOf(undo);
        if (at >= 0) pending.splice(at, 1);
      };
    },
    close() {
      for (let undo = pending.pop(); undo !== undefined; undo = pending.pop()) undo();
    },
  };
}
