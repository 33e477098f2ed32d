/** The part of untyped packages that the local stand-ins use. */

declare module 's3rver' {
  export default class S3rver {
    constructor(options: {
      readonly address: string;
      readonly port: number;
      readonly silent: boolean;
      readonly directory: string;
      readonly vhostBuckets: boolean;
      readonly configureBuckets: readonly { readonly name: string; readonly configs: string[] }[];
    });
    readonly httpServer: import('node:http').Server;
    run(): Promise<import('node:net').AddressInfo>;
    close(): Promise<void>;
  }
}

declare module 'smtp-server' {
  import type { Server } from 'node:net';
  import type { Readable } from 'node:stream';

  export interface Envelope {
    readonly mailFrom: false | { readonly address: string };
    readonly rcptTo: readonly { readonly address: string }[];
  }

  export class SMTPServer {
    constructor(options: {
      readonly disabledCommands: readonly string[];
      readonly disableReverseLookup: boolean;
      readonly size: number;
      readonly onData: (
        stream: Readable & { readonly sizeExceeded: boolean },
        session: { readonly envelope: Envelope },
        done: (error?: Error | null, message?: string) => void,
      ) => void;
    });
    readonly server: Server;
    listen(port: number, host: string, ready: () => void): void;
    close(done: () => void): void;
    on(event: 'error', listener: (error: Error) => void): void;
  }
}

declare module 'mailparser' {
  export interface Attachment {
    readonly filename?: string;
    readonly contentType: string;
    readonly content: Buffer;
    readonly size: number;
  }

  export interface ParsedMail {
    readonly subject?: string;
    readonly from?: { readonly text: string };
    readonly messageId?: string;
    readonly date?: Date;
    readonly text?: string;
    readonly html: string | false;
    readonly attachments: readonly Attachment[];
  }

  export function simpleParser(source: Buffer): Promise<ParsedMail>;
}

declare module 'oidc-provider' {
  import type { IncomingMessage, ServerResponse } from 'node:http';

  export interface Context {
    readonly oidc: {
      readonly result?: { readonly login?: { readonly accountId: string } };
      readonly session?: { readonly accountId?: string };
      readonly client?: { readonly clientId: string };
    };
    type: string;
    body: string;
  }

  export interface Grant {
    addOIDCScope(scope: string): void;
    addOIDCClaims(claims: readonly string[]): void;
    save(): Promise<string>;
  }

  export default class Provider {
    constructor(issuer: string, configuration: object);
    readonly Grant: new (of: {
      accountId: string;
      clientId: string;
    }) => Grant;
    callback(): (request: IncomingMessage, response: ServerResponse) => void;
    interactionDetails(
      request: IncomingMessage,
      response: ServerResponse,
    ): Promise<{
      readonly uid: string;
      readonly prompt: { readonly name: string };
      readonly params: Readonly<Record<string, unknown>>;
    }>;
    interactionFinished(
      request: IncomingMessage,
      response: ServerResponse,
      result: object,
      options: { readonly mergeWithLastSubmission: boolean },
    ): Promise<void>;
    on(event: 'server_error', listener: (context: Context, error: Error) => void): void;
  }

  export const interactionPolicy: {
    readonly Check: {
      new (reason: string, description: string, check: (context: Context) => boolean): object;
      readonly REQUEST_PROMPT: true;
      readonly NO_NEED_TO_PROMPT: false;
    };
    base(): {
      get(name: string): { readonly checks: { add(check: object): void } };
      remove(name: string): void;
    };
  };
}
