/** Every limit on what comes in, in one place: the schemas, the pages and the documents take them from here. */
export const LIMITS = {
  /** Bytes of one call of the public interface. */
  callBytes: 1024 * 1024,
  /** Steps of one call. */
  callSteps: 10_000,
  /** Points that one address may spend in a minute on calls without an account; what a call costs grows with its work. */
  callPoints: 600,
  /** Steps, and turns with faults, that cost one point more. */
  callPointSteps: 500,
  callPointTurns: 200_000,
  callPointChanceTurns: 20_000,
  /** Turns of one call with faults: they may have to be made one by one. A healthy machine's turns are counted instead. */
  callTurns: 20_000_000,
  /** The same where a fault acts only sometimes, which takes a draw for every fault and turn. */
  callChanceTurns: 2_000_000,
  callDraws: 20_000_000,
  /** Bytes and rows of one imported file. */
  importBytes: 1024 * 1024,
  importRows: 10_000,
  /** Steps of one run; what the core's door and the file of a run take as well. */
  runSteps: 10_000,
  nameLength: 80,
  noteLength: 500,
  runNoteLength: 2000,
  reasonLength: 500,
  emailLength: 254,
  passwordFrom: 15,
  passwordTo: 256,
} as const;
