interface SavedLineProps {
  /** `device`: written here, not yet sent. `sent`: the server has acknowledged all. `failed`: not even written here. */
  readonly state: 'device' | 'sent' | 'failed';
  /** Clock time for reading, "19:12". */
  readonly at: string;
  /** What the device is called: tablet, phone, computer. */
  readonly device?: string;
  readonly unsent?: string;
}

const sheet = {
  device: 'M7.5 16.5l4 4 7-8',
  sent: 'M7.5 13.5l4 4 7-8M6 23h14',
  failed: 'M8.5 11.5l9 9M17.5 11.5l-9 9',
} as const;

/** Where the work stands, always visible: "On this tablet 14:32" / "Sent 14:33". */
export const SavedLine = ({ state, at, device = 'tablet', unsent }: SavedLineProps) => (
  <span className="saved-line" role="status">
    <svg
      width="26"
      height="34"
      viewBox="0 0 26 34"
      aria-hidden="true"
      fill="none"
      stroke="currentColor"
    >
      <path d="M1.2 1.2h23.6v31.6H1.2z" strokeWidth="2.2" />
      <path d={sheet[state]} strokeWidth="2.4" />
    </svg>
    <span>
      <span>
        {state === 'sent' && `Sent ${at}`}
        {state === 'device' && `On this ${device} ${at}`}
        {state === 'failed' && `Not kept since ${at}`}
      </span>
      {unsent !== undefined && <span>{unsent}</span>}
    </span>
  </span>
);
