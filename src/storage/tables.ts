import type { GeneratedAlways } from 'kysely';

/** The tables as they are after the last migration. */
export interface Tables {
  approvals: {
    /** the record's place in the chain */
    position: GeneratedAlways<number>;
    id: string;
    part_number: string;
    part_revision: string;
    verdict: string;
    recorded_at: string;
    input_digest: string;
    record_digest: string;
    previous_digest: string | null;
    idempotency_key: string | null;
    /** the approval as it was answered, JSON */
    record: string;
  };
  registry: {
    kind: string;
    id: string;
    tag: string;
    /** JSON */
    value: string;
  };
  units: {
    position: GeneratedAlways<number>;
    lot: string;
    serial: string;
    measured_at: string;
    outcome: string;
    digest: string;
    /** as it was sent, JSON */
    unit: string;
    /** as it was judged, JSON */
    judged: string;
  };
  unit_counts: { lot: string; label: string; units: number };
  rollups: { lot: string; rig: string; day: string; quantity: string; moments: string; bins: string };
}
