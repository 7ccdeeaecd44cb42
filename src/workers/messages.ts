/** Everything that passes between the main thread and a worker. */
export type ToWorker =
  | { kind: 'share'; key: string; value: unknown }
  | { kind: 'forget'; key: string }
  | { kind: 'task'; id: number; name: string; input: unknown }

export type FromWorker =
  | { kind: 'ready' }
  | { kind: 'result'; id: number; output: unknown; cpuSeconds: number }
  | { kind: 'failed'; id: number; message: string; stack: string }
