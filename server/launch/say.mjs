/** One line of progress for the person at the terminal. */
export function say(line) {
  process.stdout.write(`${line}\n`)
}

/** Ends with one sentence and no stack: something the person can put right. */
export class Refusal extends Error {}

/** Runs `main`; a Refusal ends the process with its sentence, anything else with its stack. */
export async function runMain(main) {
  try {
    await main()
  } catch (error) {
    process.stderr.write(`${error instanceof Refusal ? error.message : error.stack}\n`)
    process.exitCode = 1
  }
}
