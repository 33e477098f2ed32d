import type { EntityManager } from '@mikro-orm/postgresql';
import type { Failure } from '@/domain/failure';
import type { BarnNews } from '@/domain/inspection/barn-news';
import type { HeldPart } from '@/domain/inspection/custody/tag';
import type { NoteSigner } from '@/domain/ledger/note/signed-note';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { NonCompliance } from '@/domain/verdict/non-compliance';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';

/** What the use cases need of the world. Each one names its own share: `Pick<Ports, 'db' | 'clock'>`. */
export interface Ports {
  /** A forked entity manager; one a request or job. */
  readonly db: EntityManager;
  readonly clock: Clock;
  readonly random: Random;
  readonly jobs: Jobs;
  readonly objects: Objects;
  readonly uploads: UploadsInParts;
  readonly images: Images;
  readonly mailer: Mailer;
  readonly identity: IdentityProvider;
  readonly notices: NoticePrinter;
  readonly rulebooks: RulebookPrinter;
  readonly tags: TagPrinter;
  readonly nonCompliances: NonCompliancePrinter;
  readonly keys: LedgerKeys;
  readonly heads: HeadMemory;
  readonly recordState: RecordState;
  readonly barn: BarnFeed;
  readonly site: Site;
}

export interface Clock {
  now(): Date;
}

export interface Random {
  /** UUID version 7 (RFC 9562) of the clock's instant. */
  uuid(): string;
  bytes(length: number): Uint8Array;
}

/** Where this installation is reached, and how it signs itself. */
export interface Site {
  /** Origin without a trailing slash. */
  readonly publicUrl: string;
  readonly mailFrom: string;
}

export interface JobPayloads {
  readonly 'send-mail': { readonly mailId: string };
  readonly 'make-previews': { readonly seriesId: string; readonly fileId: string };
  readonly 'render-notice': { readonly seriesId: string; readonly verdictId: string };
  readonly 'sign-checkpoint': { readonly seriesId: string };
  readonly 'remove-objects': { readonly seriesId: string };
  readonly 'remind-due': Readonly<Record<string, never>>;
  readonly 'sweep-uploads': { readonly seriesId: string; readonly fileId: string };
}

export interface Jobs {
  /** Sends on the connection of the running transaction of `em`, so that the job exists only if the act does. */
  send<Q extends keyof JobPayloads>(
    em: EntityManager,
    queue: Q,
    data: JobPayloads[Q],
    /** Not to be worked before; at once where left out. */
    notBefore?: Date,
  ): Promise<void>;
}

/** `missed`: something may have happened unheard. `closing`: nothing more will be told. */
export type BarnHears = BarnNews | 'missed' | 'closing';

/** Tells every server process what was committed in a series' barn. */
export interface BarnFeed {
  /** Follows a series until the returned function is called; throws where nothing can be heard. */
  subscribe(seriesId: string, hear: (news: BarnHears) => void): Promise<() => void>;
}

export interface ObjectHead {
  readonly bytes: number;
}

/** The object store did not answer, or not in time: nothing is lost, and later it may. */
export class StoreUnreachable extends Error {}

export interface SentPart {
  /** From 1. */
  readonly number: number;
  /** The store's name for what it got, as it answered. */
  readonly tag: string;
}

/** Uploads of one object in several requests; what arrived stays when the connection is lost. */
export interface UploadsInParts {
  /** The store's name for a new upload. */
  begin(key: string, type: string): Promise<string>;
  /** A URL to which the browser may PUT exactly this part, for a few minutes. */
  presign(key: string, uploadId: string, part: number, bytes: number): Promise<string>;
  /** Makes the object of its parts; false where they are not all there. */
  join(key: string, uploadId: string, parts: readonly SentPart[]): Promise<boolean>;
  /** Forgets the parts that were sent. */
  drop(key: string, uploadId: string): Promise<void>;
}

/** The object store. Keys are content-addressed once a file counts. All throw `StoreUnreachable`. */
export interface Objects {
  /** A URL to which the browser may PUT exactly these bytes' length and type, for a few minutes. */
  presignPut(key: string, type: string, bytes: number): Promise<string>;
  /** Nothing if there is no such object. */
  findHead(key: string): Promise<ObjectHead | undefined>;
  /** The whole object; refuses (throws) beyond `limit` bytes. */
  read(key: string, limit: number): Promise<Uint8Array>;
  write(key: string, body: Uint8Array, type: string): Promise<void>;
  remove(key: string): Promise<void>;
}

export interface ImageFacts {
  readonly type: 'image/jpeg' | 'image/png' | 'image/webp' | 'image/heic';
  readonly width: number;
  readonly height: number;
}

export interface Preview {
  readonly width: number;
  readonly bytes: Uint8Array;
}

export interface Images {
  /** Facts of a JPEG, PNG, WebP or HEIC by its content; nothing for anything else or a damaged one. */
  findFacts(bytes: Uint8Array): Promise<ImageFacts | undefined>;
  /** JPEG previews without any metadata, one for each width. */
  previews(bytes: Uint8Array, widths: readonly number[]): Promise<readonly Preview[]>;
}

export interface ProviderPerson {
  readonly issuer: string;
  readonly subject: string;
  /** Lower case. */
  readonly email: string;
  readonly emailVerified: boolean;
  readonly name: string;
}

export interface ProviderRequest {
  readonly url: string;
  readonly state: string;
  readonly nonce: string;
  readonly verifier: string;
}

export interface IdentityProvider {
  /** `fresh` asks the provider to have the person sign in anew. */
  begin(input: { readonly fresh: boolean }): Promise<ProviderRequest>;
  /** Throws if the code, the token's signature or one of its claims does not hold. */
  finish(input: {
    readonly code: string;
    readonly verifier: string;
    readonly nonce: string;
  }): Promise<ProviderPerson>;
}

export interface OutgoingMail {
  readonly to: string;
  readonly from: string;
  readonly subject: string;
  readonly text: string;
  readonly html: string;
  readonly messageId: string;
  /** Further header fields. */
  readonly headers: Readonly<Record<string, string>>;
  readonly attachments: readonly {
    readonly name: string;
    readonly type: string;
    readonly bytes: Uint8Array;
  }[];
}

/** The receiving server refused this message for good; the message says how, in its words. */
export class MailRefused extends Error {}

export interface Mailer {
  /** What the server answered. @throws MailRefused where another try would change nothing */
  send(mail: OutgoingMail): Promise<string>;
}

export interface NoticeToPrint {
  readonly notice: NoticeDocument;
  /** The ledger line that commits to the notice, and the signed head that covers it, once there is one. */
  readonly ledger: { readonly line: number; readonly checkpoint?: number | undefined };
  /** Where a reader of the print finds and checks the notice; printed as a QR code. */
  readonly url: string;
  /** Carried inside the PDF: document, salt, line and, once there is one, the proof. */
  readonly attachment: { readonly name: string; readonly text: string };
}

export interface NoticePrinter {
  /** The same notice gives the same bytes, every time. */
  print(input: NoticeToPrint): Promise<Uint8Array>;
}

export interface RulebookToPrint {
  readonly rules: RulesInForce;
  /** Of the rules in force, hexadecimal. */
  readonly hash: string;
  readonly series: string;
  readonly zone: string;
  /** The instant from which they stand unchanged; ISO 8601 in UTC. */
  readonly since: string;
  /** Where these very rules are read; printed as a QR code. */
  readonly url: string;
}

export interface RulebookPrinter {
  /** The same rules give the same bytes. */
  print(input: RulebookToPrint): Promise<Uint8Array>;
}

export interface TagToPrint {
  readonly part: HeldPart;
  readonly series: string;
  readonly zone: string;
  /** What the code carries. */
  readonly code: string;
  /** A label of 100 × 62 mm, or A4 with two of them: one for the part, one for the bag. */
  readonly paper: 'label' | 'a4';
}

export interface TagPrinter {
  /** The same part gives the same bytes. */
  print(input: TagToPrint): Promise<Uint8Array>;
}

export interface NonComplianceToPrint {
  readonly sheet: NonCompliance;
  /** Where the report stands; printed as a QR code. */
  readonly url: string;
}

export interface NonCompliancePrinter {
  /** The same report gives the same bytes. */
  print(input: NonComplianceToPrint): Promise<Uint8Array>;
}

/** The keys that sign the ledgers' heads; they are never in the database. */
export interface LedgerKeys {
  signer(seriesId: string): NoteSigner;
  /** The key that hands over to the current one, as long as the installation is given it. */
  findPrevious(seriesId: string): NoteSigner | undefined;
}

/** The last head this installation signed for each series, remembered outside the database. */
export interface HeadMemory {
  find(seriesId: string): Promise<string | undefined>;
  list(): Promise<readonly { readonly seriesId: string; readonly note: string }[]>;
  /** Returns when the note would outlast a power cut. */
  remember(seriesId: string, note: string): Promise<void>;
  /** Keeps the note under another name, where it is no longer looked at. */
  setAside(seriesId: string, word: string): Promise<void>;
}

/** Whether the record may be written: not while the database is behind a head that was signed. */
export interface RecordState {
  /** Why nothing may be written; nothing when all is well. */
  findObstacle(): Promise<Failure | undefined>;
  /** Has the next question looked up anew: something was seen that must not be. */
  doubt(): void;
}
