import type { Job } from "#shared/contract/jobs.ts";

type Listener = (job: Job) => void;

/** Tells whoever listens for a team what its jobs do. */
export class JobEvents {
  private readonly listeners = new Map<string, Set<Listener>>();

  /** @returns ends the listening */
  listen(teamId: string, listener: Listener): () => void {
    const ofTeam = this.listeners.get(teamId) ?? new Set();
    this.listeners.set(teamId, ofTeam.add(listener));
    return () => {
      ofTeam.delete(listener);
      if (ofTeam.size === 0 && this.listeners.get(teamId) === ofTeam) this.listeners.delete(teamId);
    };
  }

  tell(teamId: string, job: Job): void {
    for (const listener of this.listeners.get(teamId) ?? []) listener(job);
  }
}
