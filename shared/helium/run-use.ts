import { DomainError } from '#shared/errors'
import { litresText, heliumLitresFromMg, heliumMgFromLitres, MS_PER_HOUR } from '#shared/units/helium-units'

/** A transfer to the cryostat of a run, as the run sheet has it. */
export interface RunTransfer {
  /** Start and end, ms UTC. */
  readonly startMs: number
  readonly endMs: number
  /** Mass that left the dewar, mg. */
  readonly takenMg: number
  /** Liquid in the cryostat before and after, mg. */
  readonly beforeMg: number
  readonly afterMg: number
  /** Whether the cold mass was still being cooled; then what did not become level is mostly cooldown, not loss of the line. */
  readonly cooling: boolean
}

/** What a run's log says of helium. */
export interface RunHeliumLog {
  readonly transfers: readonly RunTransfer[]
  /** Liquid in the cryostat when the run took it over, mg. */
  readonly startMg: number
  /** Liquid in the cryostat at the last reading, mg. */
  readonly endMg: number
  /** Instant of that reading, ms UTC. */
  readonly endMs: number
  /** Gas returned to recovery during the run, mg. */
  readonly returnedMg: number
}

/** What is known of the cryostat, to split the use. */
export interface RunUseFacts {
  /** Usual static boil-off, litres of liquid per hour. */
  readonly staticBoilOffLitresPerHour: number
  /** Share of what leaves a dewar that the line loses while the cold mass is being cooled, 0 to under 1. */
  readonly transferLossShare: number
}

/** Helium of a run, all whole milligrams. */
export interface RunHeliumUse {
  /** Left the dewars for this run. */
  readonly takenMg: number
  /** Lost in the line on the way. */
  readonly transferLossMg: number
  /** Transferred to the cryostat: taken less lost in the line. */
  readonly transferredMg: number
  /** In the cryostat more at the end than at the start (below zero: less). */
  readonly leftMg: number
  /** Transferred less left: always `cooldownMg + staticBoilOffMg + measurementMg`. */
  readonly usedMg: number
  readonly cooldownMg: number
  readonly staticBoilOffMg: number
  readonly measurementMg: number
  /** Came back to recovery. */
  readonly returnedMg: number
  /** Used or lost in the line and not come back (below zero: more came back than this run used). */
  readonly notReturnedMg: number
  /** Sentences on what does not fit together in the log. */
  readonly remarks: readonly string[]
}

/** Splits one transfer into line loss, cooldown, and what became level. */
function splitTransfer(transfer: RunTransfer, lossShare: number): { lossMg: number, cooldownMg: number } {
  const vanishedMg = Math.max(0, transfer.takenMg - (transfer.afterMg - transfer.beforeMg))
  if (!transfer.cooling) return { lossMg: vanishedMg, cooldownMg: 0 }
  const lossMg = Math.min(vanishedMg, Math.round(transfer.takenMg * lossShare))
  return { lossMg, cooldownMg: vanishedMg - lossMg }
}

function checkLog(log: RunHeliumLog, facts: RunUseFacts): void {
  const masses = [log.startMg, log.endMg, log.returnedMg, ...log.transfers.flatMap(({ takenMg, beforeMg, afterMg }) => [takenMg, beforeMg, afterMg])]
  if (!masses.every(mass => Number.isSafeInteger(mass) && mass >= 0)) {
    throw new DomainError('invalid', 'The helium log of the run holds an amount that is not a whole number of milligrams of zero or more. Correct that entry.', ['log'])
  }
  if (!(facts.transferLossShare >= 0 && facts.transferLossShare < 1 && facts.staticBoilOffLitresPerHour >= 0)) {
    throw new DomainError('invalid', 'The transfer loss is a share from 0 to under 1, and the static boil-off zero or more litres an hour.', ['facts'])
  }
}

/** Hours with liquid between transfers: from the end of the first transfer to the last reading, less the transfers themselves. */
function coldHours({ transfers, startMg, endMs }: RunHeliumLog): number {
  const sorted = [...transfers].sort((a, b) => a.startMs - b.startMs)
  const first = sorted[0]
  if (!first || first.endMs >= endMs) return 0
  // A bath that already held liquid boils before its first transfer too, but that stretch belongs to whoever filled it.
  const from = startMg > 0 ? first.startMs : first.endMs
  const pouringMs = sorted.reduce((sum, { startMs, endMs: stopMs }) =>
    sum + Math.max(0, Math.min(stopMs, endMs) - Math.max(startMs, from)), 0)
  return Math.max(0, endMs - from - pouringMs) / MS_PER_HOUR
}

/**
 * Helium a run used, from its log: what was transferred to its cryostat less what is left in it, split into cooldown,
 * static boil-off and measurement. What vanished during a transfer into a cold cryostat is loss of the line; during the
 * cooldown the line loses its usual share and the cold mass boils off the rest. Between transfers the usual static boil-off
 * is counted first; what boiled off beyond it is the measurement's.
 *
 * @param log Transfers, first and last content in mg, and gas returned in mg.
 * @param facts Usual static boil-off in L/h and the line's usual loss.
 * @returns Masses in mg that add up exactly, and remarks on what does not fit.
 * @throws DomainError when an amount is no mass.
 */
export function runHeliumUse(log: RunHeliumLog, facts: RunUseFacts): RunHeliumUse {
  checkLog(log, facts)
  const remarks: string[] = []
  const splits = log.transfers.map(transfer => splitTransfer(transfer, facts.transferLossShare))
  const takenMg = log.transfers.reduce((sum, transfer) => sum + transfer.takenMg, 0)
  const transferLossMg = splits.reduce((sum, { lossMg }) => sum + lossMg, 0)
  const transferredMg = takenMg - transferLossMg
  const leftMg = log.endMg - log.startMg
  const usedMg = transferredMg - leftMg

  log.transfers.forEach(({ takenMg: taken, beforeMg, afterMg }, index) => {
    if (afterMg - beforeMg > taken) {
      remarks.push(`In transfer ${index + 1} the cryostat gained more than the dewar gave. Check the dewar weight and both levels.`)
    }
  })
  if (usedMg < 0) {
    remarks.push(`The cryostat holds ${litresText(heliumLitresFromMg(-usedMg))} more than was transferred. Check the last level and the transfers.`)
  }
  const cooldownMg = Math.min(Math.max(0, usedMg), splits.reduce((sum, split) => sum + split.cooldownMg, 0))
  const boiledMg = usedMg - cooldownMg
  const staticBoilOffMg = Math.max(0, Math.min(boiledMg, heliumMgFromLitres(facts.staticBoilOffLitresPerHour * coldHours(log))))
  const notReturnedMg = usedMg + transferLossMg - log.returnedMg
  if (notReturnedMg < 0) {
    remarks.push('More gas came back to recovery than this run used. Check the gas meter, or whether another cryostat fed the same line.')
  }
  return {
    takenMg, transferLossMg, transferredMg, leftMg, usedMg,
    cooldownMg, staticBoilOffMg, measurementMg: boiledMg - staticBoilOffMg,
    returnedMg: log.returnedMg, notReturnedMg, remarks,
  }
}
