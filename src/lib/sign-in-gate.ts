import { useSyncExternalStore } from "react";

/**
 * A session may end in the middle of an edit. Requests that are turned away for it wait here until the person has signed
 * in again over the page, and are then sent once more; nothing that was typed is touched.
 */
let waiting: ((signedIn: boolean) => void)[] = [];
const listeners = new Set<() => void>();

const tell = () => {
  for (const listener of listeners) listener();
};

/** @returns whether the request is worth sending again */
export function waitForSignIn(): Promise<boolean> {
  return new Promise((resolve) => {
    waiting.push(resolve);
    tell();
  });
}

/** Lets everything go on that waits: signed in, or given up. */
export function settleSignIn(signedIn: boolean): void {
  const settled = waiting;
  waiting = [];
  for (const resolve of settled) resolve(signedIn);
  tell();
}

/** True while a request waits for a sign-in. */
export function useSignInWanted(): boolean {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => waiting.length > 0,
  );
}
