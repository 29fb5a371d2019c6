/** Every limit on what comes in, in one place: the schemas, the pages and the documents take them from here. */
export const LIMITS = {
  /** Bytes of one call of the public interface. */
  callBytes: 1024 * 1024,
  /** Steps of one call. */
  callSteps: 10_000,
  /** Bytes and rows of one imported file. */
  importBytes: 1024 * 1024,
  importRows: 10_000,
  nameLength: 80,
  noteLength: 500,
  runNoteLength: 2000,
  reasonLength: 500,
  emailLength: 254,
  passwordFrom: 15,
  passwordTo: 256,
} as const;
