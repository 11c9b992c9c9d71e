/** Words of the Hand over screen: what each road is for, what is being made, what a packet holds. */
const count = (n: number, one: string, many: string) => `${n} ${n === 1 ? one : many}`;
const readings = (n: number) => count(n, 'reading', 'readings');

export const handOverText = {
  give: 'Hand on',
  giveLead: 'Nothing leaves this phone until you press Share or Save.',
  none: 'No readings yet. Take one, or take a packet in.',
  which: 'Which readings',
  thisReading: 'This reading',
  whiches: {
    one: (name: string) => name,
    chosen: (n: number) => `Chosen: ${readings(n)}`,
    round: (n: number) => `This round: ${readings(n)}`,
    all: (n: number) => `Everything: ${readings(n)}`,
  },
  choose: 'Choose readings from the list',
  asWhat: 'As what',
  forms: {
    report: {
      title: 'Report',
      note: 'A page for people: sentences, pictures, what to do. Prints on A4 and Letter, and can be taken in again here.',
    },
    packet: {
      title: 'Packet',
      note: 'For Thrumbook on another phone or laptop: everything with its raw samples, places and sources.',
    },
    table: { title: 'Table', note: 'One row a reading with its units, for a spreadsheet (CSV).' },
  },
  single: 'Files of this one reading',
  singleForms: {
    samplesCsv: { title: 'Samples as CSV', note: 'Time and acceleration as recorded.' },
    samplesNpy: { title: 'Samples as NPY', note: 'The same for NumPy.' },
    ladder: { title: 'Ladder' },
    spectrum: { title: 'Spectrum' },
    'ring-down': { title: 'Ring-down or pass' },
  },
  asPng: 'PNG',
  asSvg: 'SVG',
  making: 'Making it…',
  cancel: 'Cancel',
  ready: 'Ready',
  size: (megabytes: string) => `${megabytes} MB`,
  share: 'Share…',
  save: 'Save',
  print: 'Print',
  putAway: 'Put away',
  shared: 'Handed to the share sheet.',
  saved: 'Saved with your downloads.',
  notShared:
    'The share sheet did not take it. Save it instead, or hand the report over: it carries the same readings.',
  cannotShare: {
    packet:
      'The share sheet of this browser takes no packets. Save it and send the file, or share the report: it carries the same readings inside.',
    other: 'The share sheet of this browser does not take this kind of file.',
  },
  onlyShare:
    'Started from the home screen, an iPhone can only share: choose “Save to Files” there to keep a copy.',
  failures: {
    nothing: 'There is nothing of this kind to make here.',
    'too-many': 'That is more than one report can print (80 readings). Choose fewer, or make a packet.',
    error: 'It could not be made. The error is noted under This phone, Error log.',
  },

  receive: 'Take in',
  receiveLead:
    'A packet or a report from another phone: you see what is in it before anything is taken, and nothing that you have is changed. A recording (CSV, TSV) becomes a reading of its own. You can also drop a file anywhere on the page.',
  open: 'Open a file',
  looking: (name: string) => `Looking into ${name}…`,
  seen: {
    fresh: (n: number) => `${readings(n)} not here yet`,
    nothingNew: 'Everything in it is here already.',
    known: (n: number) => `${readings(n)} here already, left as they are`,
    others: (n: number) =>
      `${count(n, 'entry', 'entries')} besides: places, sources, names, notes, photos, redone analyses`,
    newer: (n: number) =>
      `${count(n, 'entry', 'entries')} made by a newer version: kept and handed on, not shown`,
    refused: (n: number) => `${n} not whole, left out`,
    file: 'the file itself',
    more: (n: number) => `and ${n} more`,
    practice: 'practice',
    noPlace: 'No spot named',
  },
  take: (n: number) => (n > 0 ? `Take in ${readings(n)}` : 'Take it in'),
  taking: 'Taking in…',
  stopped: 'Stopping keeps what was taken so far.',
  taken: (n: number) => (n > 0 ? `${readings(n)} taken in.` : 'Taken in.'),
  leftOut: (n: number) => `${count(n, 'entry', 'entries')} left out.`,
  toReadings: 'Show the readings',
  leave: 'Leave it',
  close: 'Close',
  refusals: {
    'no-packet': 'This is no packet and carries none.',
    'nothing-whole': 'Nothing in this packet is whole.',
    encrypted: 'It is locked with a password.',
    packing: 'It is packed in a way this program does not read.',
    'cut-short': 'The file ends too early. Ask for it once more.',
    size: 'Its size is not what the packet says.',
    checksum: 'It was changed or damaged on the way.',
    'samples-missing': 'Its raw samples are missing.',
    'samples-size': 'Its raw samples have another length than noted.',
    'samples-hash': 'Its raw samples are not those it was made from.',
    differs: 'It is here already with other content. The first is kept.',
    path: 'Its name would lead out of the packet.',
    twice: 'There are two of the same name. The first counts.',
    name: 'It stands under another name than its own.',
    'not-json': 'It cannot be read.',
    manifest: 'The note at the front cannot be read.',
    'not-an-entry': 'There is damage here.',
  } as Readonly<Record<string, string>>,
  failedTaking: {
    quota: 'This phone has no room for it. What was taken so far is kept.',
    other: 'It could not be taken in. What was taken so far is kept; the error is noted under This phone.',
  },

  backUp: 'Back-up',
  backUpLead:
    'A packet of everything, trash and history included. To restore: take it in, here or on another phone. What is there already stays as it is.',
  backUpMake: 'Back up everything',
  backUpLast: (when: string) => `Last made here: ${when}.`,
  backUpNever: 'None made here yet.',

  help: 'Which road for what',
  roads: [
    {
      name: 'To show somebody',
      text: 'Make a report and share or print it. It opens in any browser, without the app and without a network. Each page says that it is an indicative survey.',
    },
    {
      name: 'From the phone to your laptop',
      text: 'Make a packet, save it, and bring it over by cable, e-mail or a shared folder. On the laptop open Thrumbook, then Hand over, Take in. If the phone’s share sheet refuses packets, share the report instead: it carries the same readings.',
    },
    {
      name: 'Several phones, one laptop',
      text: 'Take each phone’s packet in, in any order, as often as you like: a reading arrives once. Names and notes that two people changed are shown side by side for you to settle.',
    },
    {
      name: 'Into a spreadsheet or a program',
      text: 'The table has one row a reading. The samples of one reading come as CSV or for NumPy; the analysis command reads packets and reports whole.',
    },
    {
      name: 'So that nothing is lost',
      text: 'Back up everything after each round. Clearing the browser’s data, or losing the phone, loses what was not handed over.',
    },
  ],
} as const;

/** Why something in a packet was left out, in its own words where there are any. */
export const refusalReason = (facts: Readonly<Record<string, number | string>>): string | undefined =>
  handOverText.refusals[String(facts['reason'] ?? '')];
