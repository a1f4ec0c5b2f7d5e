import fc from "fast-check";

/** G-code as people and slicers write it, for property tests. */

const digits = (min: number, max: number): fc.Arbitrary<string> =>
  fc.string({ unit: fc.constantFrom(..."0123456789"), minLength: min, maxLength: max });

/** An unsigned decimal: leading zeros, leading point, trailing point. */
export const decimal = (most = 9): fc.Arbitrary<string> =>
  fc.oneof(
    digits(1, most),
    fc.tuple(digits(0, most), digits(1, most)).map(([whole, part]) => `${whole}.${part}`),
    digits(1, most).map((whole) => `${whole}.`),
  );

export const signed = (most?: number): fc.Arbitrary<string> =>
  fc.tuple(fc.constantFrom("", "", "-", "+"), decimal(most)).map((parts) => parts.join(""));

export const blanks = fc.constantFrom("", "", " ", "  ", "\t", " \t");

/** The same text with blanks strewn between its characters. */
export const strewn = (text: string): fc.Arbitrary<string> =>
  fc
    .array(blanks, { minLength: text.length, maxLength: text.length })
    .map((gaps) => [...text].map((character, k) => (k > 0 ? gaps[k] : "") + character).join(""));

const eitherCase = (letter: string): fc.Arbitrary<string> => fc.constantFrom(letter, letter.toLowerCase());

const word = (letter: string, number: fc.Arbitrary<string>): fc.Arbitrary<string> =>
  fc.tuple(eitherCase(letter), number).map((parts) => parts.join(""));

/** `M` words that neither take text nor end a line otherwise. */
const machineCommand = fc.constantFrom("3", "82", "83.0", "0104", "106", "140", "+204", "400", "862.3");

/** Words in any order: each letter once but G, which may stand three times. */
export const words: fc.Arbitrary<string[]> = fc
  .tuple(
    fc.subarray([..."ABCDEFHIJKLOPQRSTUVWXYZ"], { maxLength: 7 }),
    fc.array(fc.constantFrom("0", "1", "01", "2", "17", "28.1", "90", "92"), { maxLength: 3 }),
    fc.option(machineCommand, { nil: undefined }),
  )
  .chain(([letters, gs, m]) =>
    fc
      .tuple(
        ...letters.map((letter) => word(letter, signed())),
        ...gs.map((g) => word("G", fc.constant(g))),
        ...(m ? [word("M", fc.constant(m))] : []),
      )
      .chain((made) => fc.shuffledSubarray(made, { minLength: made.length })),
  );

const commentText = fc.string({ unit: fc.constantFrom(..."abcXYG 01.;*%\u00e9"), maxLength: 12 });

/** A closed comment in parentheses, sometimes with another one inside. */
export const parenthesis: fc.Arbitrary<string> = fc.oneof(
  commentText.map((text) => `(${text})`),
  fc.tuple(commentText, commentText).map(([a, b]) => `(${a}(${b})${a})`),
);

/** Blanks inside a word; the number of an M word stands in one piece. */
const apart = (one: string): fc.Arbitrary<string> =>
  /^m/i.test(one) ? fc.constantFrom(` ${one}`, `${one[0]}\t ${one.slice(1)}`) : strewn(one);

/** A whole line of words: number, blanks anywhere, comments between words, checksum, comment at the end. */
export const wordLine: fc.Arbitrary<string> = fc
  .record({
    number: fc.option(fc.nat(99_999), { nil: undefined }),
    parts: words.chain((made) => fc.tuple(...made.map((one) => fc.oneof(fc.constant(one), apart(one))))),
    gaps: fc.array(fc.oneof(blanks, blanks, blanks, parenthesis), { minLength: 10, maxLength: 10 }),
    checksum: fc.option(fc.nat(255), { nil: undefined }),
    comment: fc.option(commentText, { nil: undefined }),
  })
  .map(({ number, parts, gaps, checksum, comment }) =>
    [
      number === undefined ? "" : `N${number} `,
      ...parts.map((part, k) => gaps[k % gaps.length] + part),
      gaps[9],
      checksum === undefined || number === undefined ? "" : `*${checksum}`,
      comment === undefined ? "" : `;${comment}`,
    ].join(""),
  );

/** The shape that nearly all lines have. */
export const moveLine: fc.Arbitrary<string> = fc
  .tuple(
    fc.constantFrom("G0", "G1", "g0", "g1", "G00", "G01", "g01"),
    fc.subarray([..."XYZEF"]).chain((letters) => fc.shuffledSubarray(letters, { minLength: letters.length })),
    fc.constantFrom("", " ", "  "),
  )
  .chain(([g, letters, gap]) =>
    fc.tuple(...letters.map((letter) => word(letter, signed(10)))).map((made) => [g, ...made].join(gap)),
  );
