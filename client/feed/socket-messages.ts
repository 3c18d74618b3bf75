import { Observable } from 'rxjs';
import { liveProtocol, type LiveMessage, type LiveWatch } from '../../core/live/message.ts';
import { readMessage } from './read-message.ts';

/**
 * Messages of one live socket, opened at subscription with `watch` as its first word. Never completes: a close, a
 * message that cannot be read and a socket nothing is heard of are errors, so that the caller connects again.
 */
export function messagesOf(url: string, watch: () => LiveWatch): Observable<LiveMessage> {
  return new Observable((subscriber) => {
    const socket = new WebSocket(url, liveProtocol);
    socket.onopen = () => {
      socket.send(JSON.stringify(watch()));
    };
    socket.onmessage = (event: MessageEvent<unknown>) => {
      const read = readMessage(String(event.data));
      if (read.ok) subscriber.next(read.value);
      else subscriber.error(new Error(read.fault));
    };
    socket.onclose = (event) => {
      subscriber.error(new Error(`live socket closed (${event.code})`));
    };
    return () => {
      socket.onopen = socket.onmessage = socket.onclose = null;
      socket.close();
    };
  });
}
