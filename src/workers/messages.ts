/** Everything that passes between the main thread and a worker. */
export type ToWorker =
  | { kind: 'share'; scope: string; key: string; value: unknown }
  | { kind: 'forget'; scope: string; key: string }
  | { kind: 'task'; id: number; name: string; scope: string; input: unknown }

export type FromWorker =
  | { kind: 'ready' }
  | { kind: 'result'; id: number; output: unknown; cpuSeconds: number }
  | { kind: 'failed'; id: number; message: string; stack: string }
