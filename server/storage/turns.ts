/**
 * One piece of work after the other. Bytes are put in place and recorded, or found unused and removed, in turns: so no
 * bytes are removed that somebody is about to refer to.
 */
export class Turns {
  private last: Promise<unknown> = Promise.resolve();

  take<Result>(work: () => Promise<Result>): Promise<Result> {
    const turn = this.last.then(work);
    this.last = turn.catch(() => {});
    return turn;
  }
}
