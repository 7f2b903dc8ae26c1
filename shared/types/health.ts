/** Whether one thing the server stands on answers, and how long it took. */
export interface HealthCheck { name: 'database' | 'file store' | 'job queue', ok: boolean, ms: number }
export interface Health { ok: boolean, checks: HealthCheck[] }
