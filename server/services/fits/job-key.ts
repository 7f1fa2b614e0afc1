/** At most one living job computes one request of one target with one engine version. */
export function jobKeyOf(input: { targetId: string; inputHash: string; engineVersion: string }): string {
  return `run-fit|${input.targetId}|${input.inputHash}|${input.engineVersion}`
}
