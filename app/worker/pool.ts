import type { CarryClones, CloneOutcomes, ClonePlan } from '../../core/uncertainty/clones';
import type { CarrierPort } from './carrier-messages';
import { WorkerError } from './wire-error';

/** Batches at a carrier at once: the next one waits there while the first is carried. */
const BATCHES_AT_A_CARRIER = 2;
/** A batch that was lost with its carrier is given to another one, once. */
const ATTEMPTS = 2;

/** Carriers stopped working, and a batch of clones was lost with them. */
export class CarrierDied extends Error {
  readonly code = 'carrier-died';
  override name = 'CarrierDied';
}

export interface CarrierPool {
  /** How many batches may be asked for at once to keep every carrier busy. */
  readonly parallel: number;
  /** Carries batches of one case; those of several cases may be under way side by side. */
  carryFor(plan: ClonePlan): CarryClones;
  /** Ends all carriers; what is pending is rejected. The next batch starts new ones. */
  close(): void;
}

interface Batch {
  id: number;
  plan: ClonePlan;
  z: Float64Array;
  attempts: number;
  resolve(outcomes: CloneOutcomes): void;
  reject(error: Error): void;
}

interface Member {
  port: CarrierPort;
  plan: ClonePlan | null;
  batches: Map<number, Batch>;
}

/**
 * Spreads batches of clones over carriers, which are started when there is work for them and kept.
 *
 * @param openPort starts a carrier
 * @param size     most carriers at once
 */
export function createCarrierPool(openPort: () => CarrierPort, size: number): CarrierPool {
  const members: Member[] = [];
  const waiting: Batch[] = [];
  let nextId = 1;

  function startMember(): Member {
    const member: Member = { port: openPort(), plan: null, batches: new Map() };
    members.push(member);
    member.port.listen(
      (message) => {
        const batch = member.batches.get(message.id);
        if (batch === undefined) return;
        member.batches.delete(message.id);
        if (message.type === 'error') batch.reject(new WorkerError(message.error));
        else batch.resolve(message.outcomes);
        handOut();
      },
      (reason) => {
        const at = members.indexOf(member);
        if (at < 0) return;
        members.splice(at, 1);
        member.port.close();
        for (const batch of member.batches.values()) retry(batch, reason);
        handOut();
      },
    );
    return member;
  }

  function retry(batch: Batch, reason: string): void {
    if (batch.attempts < ATTEMPTS) waiting.unshift(batch);
    else batch.reject(new CarrierDied(`A batch of clones was lost twice. ${reason}`));
  }

  /** The least busy carrier that can take one more batch; a new one before any has to wait. */
  function freeMember(): Member | null {
    let best: Member | null = null;
    for (const member of members) {
      if (best === null || member.batches.size < best.batches.size) best = member;
    }
    if ((best === null || best.batches.size > 0) && members.length < size) return startMember();
    return best !== null && best.batches.size < BATCHES_AT_A_CARRIER ? best : null;
  }

  function handOut(): void {
    while (waiting.length > 0) {
      const member = freeMember();
      const batch = member === null ? undefined : waiting.shift();
      if (member === null || batch === undefined) return;
      batch.attempts += 1;
      member.batches.set(batch.id, batch);
      if (member.plan !== batch.plan) {
        member.plan = batch.plan;
        member.port.post({ type: 'plan', plan: batch.plan });
      }
      // Copied, not transferred: the batch may have to be sent again.
      member.port.post({ type: 'carry', id: batch.id, z: batch.z });
    }
  }

  return {
    parallel: size * BATCHES_AT_A_CARRIER,
    carryFor: (plan) => (z) =>
      new Promise((resolve, reject) => {
        waiting.push({ id: nextId++, plan, z, attempts: 0, resolve, reject });
        handOut();
      }),
    close() {
      const ended = members.splice(0);
      const lost = [...waiting.splice(0), ...ended.flatMap(({ batches }) => [...batches.values()])];
      for (const { port } of ended) port.close();
      for (const batch of lost) batch.reject(new CarrierDied('The carriers were closed.'));
    },
  };
}
