import { destination, pino, type Logger } from 'pino';

export type LogLevel = 'debug' | 'info' | 'warn' | 'error' | 'silent';

/** Structured log, one JSON object a line on standard error; standard output belongs to what a command prints. */
export function logOf(level: LogLevel): Logger {
  return pino({ level, base: null, timestamp: () => `,"time":"${new Date().toISOString()}"`, formatters: { level: (label) => ({ level: label }) } }, destination({ dest: 2, sync: true }));
}
