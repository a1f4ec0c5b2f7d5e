/** Room for one step, by node. */
export class StepWork {
  readonly k1: Float64Array;
  readonly k2: Float64Array;
  readonly k3: Float64Array;
  readonly ratio: Float64Array;
  readonly inverse: Float64Array;
  readonly lossWK: Float64Array;
  readonly radiationWK: Float64Array;
  readonly foreseenJ: Float64Array;
  readonly wallsK4: Float64Array;
  readonly fromAbove: Float64Array;

  constructor(nodes: number) {
    this.k1 = new Float64Array(nodes);
    this.k2 = new Float64Array(nodes);
    this.k3 = new Float64Array(nodes);
    this.ratio = new Float64Array(nodes);
    this.inverse = new Float64Array(nodes);
    this.lossWK = new Float64Array(nodes);
    this.radiationWK = new Float64Array(nodes);
    this.foreseenJ = new Float64Array(nodes);
    this.wallsK4 = new Float64Array(nodes);
    this.fromAbove = new Float64Array(nodes);
  }
}
