/** Where in the input a refusal or finding points: any part that is known. */
export interface Place {
  /** 1-based line of the toolpath */
  line?: number;
  /** 1-based layer */
  layer?: number;
  /** path inside a JSON document, e.g. `zones[1].cooling.points[0]` */
  path?: string;
}

/**
 * Input that is not accepted. Carries what is wrong, where, and what to do about it; the command line prints it
 * with exit status 3, the server answers it as a problem document. Anything else thrown is a fault of ours.
 */
export class Refusal extends Error {
  override readonly name = "Refusal";
  readonly code: string;
  readonly remedy: string;
  readonly place: Place;

  /**
   * @param code stable kebab-case identifier
   * @param message what is wrong, one sentence that names the numbers
   * @param remedy what the person can do about it, one sentence
   */
  constructor(code: string, message: string, remedy: string, place: Place = {}) {
    super(message);
    this.code = code;
    this.remedy = remedy;
    this.place = place;
  }
}
