import { once } from 'node:events';
import type { AddressInfo } from 'node:net';
import { buffer } from 'node:stream/consumers';
import { SMTPServer, type SMTPServerSession } from 'smtp-server';
import type { MessageFolder } from './message-folder';
import type { SmtpFaults } from './smtp-faults';

export interface SmtpListening {
  port: number;
  close(): Promise<void>;
}

const largestMessage = 5 * 1024 * 1024;

/** Takes in mail on 127.0.0.1 and hands none on. Port 0 takes a free one. */
export async function listenForMail(
  port: number,
  folder: MessageFolder,
  faults: SmtpFaults,
): Promise<SmtpListening> {
  const server = new SMTPServer({
    authOptional: true,
    // Its certificate would be self-signed, and nothing leaves this machine.
    disabledCommands: ['STARTTLS', 'AUTH'],
    disableReverseLookup: true,
    logger: false,
    size: largestMessage,
    onConnect(_session, callback) {
      const fault = faults.next('refuse-connection');
      callback(fault ? refusal(fault.code) : null);
    },
    onRcptTo(_address, session, callback) {
      const fault = faults.next('refuse-recipient', 'drop-before-message');
      if (fault?.kind === 'drop-before-message') drop(server, session);
      else callback(fault ? refusal(fault.code) : null);
    },
    onData(stream, session, callback) {
      takeIn(stream, session).then(
        (answer) => answer === 'dropped' || callback(answer),
        (error: unknown) => callback(error as Error),
      );
    },
  });

  async function takeIn(
    stream: NodeJS.ReadableStream,
    session: SMTPServerSession,
  ): Promise<Error | null | 'dropped'> {
    const raw = (await buffer(stream)).toString('latin1');
    const fault = faults.next('refuse-message', 'drop-after-message');
    if (fault?.kind === 'refuse-message') return refusal(fault.code);
    if (!fault || fault.keep) await folder.add({ ...envelopeOf(session), raw });
    if (!fault) return null;
    drop(server, session);
    return 'dropped';
  }

  // A client that hangs up is no fault of the catcher's; a port that is taken fails the wait below.
  server.on('error', () => undefined);
  const listening = server.listen(port, '127.0.0.1');
  await once(listening, 'listening');
  return {
    port: (listening.address() as AddressInfo).port,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        for (const connection of server.connections) connection.close();
      }),
  };
}

function refusal(code: number): Error {
  return Object.assign(new Error('Refused by the catcher, as asked'), { responseCode: code });
}

function envelopeOf({ envelope }: SMTPServerSession): { from: string; recipients: string[] } {
  return {
    from: envelope.mailFrom ? envelope.mailFrom.address : '',
    recipients: envelope.rcptTo.map(({ address }) => address),
  };
}

/** Cuts a session's connection without a word. */
function drop(server: SMTPServer, session: SMTPServerSession): void {
  for (const connection of server.connections) {
    if (connection.id === session.id) connection._socket.destroy();
  }
}
