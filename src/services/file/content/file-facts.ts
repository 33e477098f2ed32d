/** What a file is, read from its bytes. */
export interface FileFacts {
  readonly type: string;
  readonly width: number | null;
  readonly height: number | null;
}
