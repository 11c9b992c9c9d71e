/** Words of the reading screen that are not a judgement of the trade (those stand beside this file by subject). */
import type { Analysis, FoldVerdict, Mode, Procedure, TimingFacts } from '../core/model/analysis.ts';
import type { AmplificationKind } from '../core/model/source.ts';
import type { WayOutKind } from '../core/model/judgement.ts';

const count = (n: number, one: string, many: string) => `${n} ${n === 1 ? one : many}`;

const PROCEDURES: Readonly<Record<Procedure, string>> = {
  tap: 'tap test',
  running: 'running',
  ambient: 'ambient',
  coastdown: 'coast-down',
};

const METHODS: Readonly<Record<Mode['method'], string>> = {
  'ring-down-fit': 'joint fit of all ring-downs on the true time stamps',
  'ring-down-fit-rounding-aware': 'joint fit of all ring-downs that knows the rounding of this sensor',
  'ambient-likelihood': 'maximum likelihood under random excitation (Whittle)',
  'ambient-likelihood-debiased': 'maximum likelihood under random excitation, corrected for the short record',
  'coastdown-fit': 'complex fit of the pass through resonance',
};

const TIMINGS: Readonly<Record<TimingFacts['model'], string>> = {
  stamps: 'the time stamps are true',
  clock: 'a steady clock behind late stamps',
  mixed: 'partly late stamps, corrected',
};

const AMPLIFIED: Readonly<Record<AmplificationKind, string>> = {
  force: 'a steady force',
  base: 'the motion of its support',
  unbalance: 'an unbalance',
};

const CHANGES: Readonly<Record<WayOutKind, string>> = {
  speed: 'Speed',
  stiffness: 'Stiffness',
  mass: 'Mass',
  damping: 'Damping',
  isolation: 'Isolation',
};

const FOLDS: Readonly<Record<FoldVerdict, string>> = {
  direct: 'at its true frequency',
  folded: 'folded from above half the rate',
  undecided: 'may be folded from above half the rate',
};

export const readingText = {
  back: 'Back',
  loading: 'Opening the reading…',
  missing: 'This reading is not on this phone.',
  missingNote: 'It may be on another phone or laptop of the team, or it was erased here.',
  newer: 'This reading was made by a newer version of the app.',
  newerNote: 'It is kept and handed on unchanged. Load the app again while online to open it.',
  unplaced: 'No spot yet',
  nameSpot: 'Name this spot',
  changeSpot: 'Change spot',
  procedureName: (procedure: Procedure) => PROCEDURES[procedure],
  indicativeNote:
    'Where people could be hurt, a licensed engineer comes first. Local rules and licensed practice come before this reading.',

  practice: 'Practice',
  practiceNote: 'Simulated: it says nothing about a real structure.',
  trashed: 'This reading is in the trash.',
  restore: 'Put it back',
  trash: 'Move to trash',
  handOver: 'Hand over',
  again: 'Same spot again',
  next: 'Next spot',

  trust: { good: 'Good', fair: 'Fair', poor: 'Poor' },
  trustName: 'trust',
  doubtCount: (n: number) => (n === 0 ? 'no doubts' : count(n, 'doubt', 'doubts')),
  tapCount: (n: number) => count(n, 'tap', 'taps'),

  noMode: {
    tap: {
      title: 'What that means',
      meaning:
        'Nothing rang clearly enough to be told from noise. It may be stiff, heavily damped, or ring above what this phone sees; the verdict on sources is open, not clear.',
      todo: [
        'Tap harder, with the fist or a rubber mallet, and wait for quiet between taps.',
        'Lay the phone where it moves most: mid-span, the free end, the corner far from supports.',
        'Fix the phone with putty or a strap, and tap in the other direction too.',
      ],
    },
    ambient: {
      title: 'What that means',
      meaning:
        'Wind, traffic and people did not shake it enough to show a mode in this time. The verdict on sources is open, not clear.',
      todo: [
        'Record longer: ten minutes instead of five.',
        'Lay the phone nearer to the middle of the span.',
        'Tap it, or let it ring after a bounce, and take a tap reading.',
      ],
    },
    coastdown: {
      title: 'What that means',
      meaning:
        'No resonance stood out in the range the machine passed through. One above its running speed, or below where it was lost, would not show.',
      todo: [
        'Start recording before it is switched off, and let it run out until it stands still.',
        'With the machine locked out, tap the spot.',
      ],
    },
    running: {
      title: 'What that means',
      meaning:
        'A running machine shows its own lines, which says how strongly it shakes, not what rings by itself.',
      todo: [
        'Stop it, lock it out, and tap this spot: then the speeds to keep out of can be told.',
        'Or record while it slows down, from before it is switched off.',
      ],
    },
  },
  numbers: 'Numbers',
  frequency: 'natural frequency',
  damping: 'damping ratio',
  dampingUnsaid: 'not said while the frequency is in doubt',
  largest: 'largest after a tap',
  rmsAmplitude: 'rms of the mode',
  passAmplitude: 'largest in the pass',
  vertical: 'Vertical',
  sideways: 'Sideways',
  oblique: 'Slanting',
  verticalShare: (percent: string) => `${percent} of the motion along gravity`,
  directionUnknown: 'gravity unknown',
  halfAmplitude: 'rings down to half',
  cycles: (n: string) => `in ${n} cycles`,
  tone: 'strongest tone',
  toneAmplitude: 'its amplitude',
  velocity: 'rms velocity',
  velocityAtLeast: 'rms velocity, at least',
  strongest: 'peak acceleration',
  halving: {
    taps: (n: number) => `${count(n, 'more tap', 'more taps')} would halve what stands after ±.`,
    seconds: (seconds: number) =>
      seconds < 120
        ? `${seconds} s more would halve what stands after ±.`
        : `${Math.round(seconds / 60)} min more would halve what stands after ±.`,
  },
  modes: (n: number) => (n === 1 ? 'The mode in full' : `All ${n} modes`),
  tones: (n: number) => (n === 1 ? 'The tone in full' : `All ${n} tones`),
  modeNumber: (n: number) => `Mode ${n}`,
  modeRows: {
    frequency: 'Frequency',
    damping: 'Damping',
    largest: 'Largest',
    direction: 'Direction',
    halfPower: 'Half-power',
    logDecrement: 'Log decrement',
    fold: 'Appears at',
    method: 'Method',
  },
  toneHead: ['Tone', 'Amplitude', 'What fits', 'Where it appears'],
  noMatch: 'no source entered fits',
  foldedImageOf: (name: string) => `folded image of ${name}`,
  method: (method: Mode['method']) => METHODS[method],
  fold: (fold: FoldVerdict) => FOLDS[fold],
  candidates: (list: string) => `could be ${list}`,

  ladder: {
    tone: (frequency: string) => `tone ${frequency}`,
    name: 'Ladder',
    title: 'Ladder',
    keys: 'Arrow keys go from mark to mark, plus and minus zoom, 0 shows the whole.',
    closer: 'Closer',
    wider: 'Wider',
    whole: 'Whole range',
    structure: 'structure',
    sources: 'sources',
    amplification: 'amplifies a steady force',
    blindAbove: (frequency: string) => `blind above ${frequency}`,
    blindBelow: (frequency: string) => `blind below ${frequency}`,
    noMode: 'No mode found here. That does not mean there is none.',
    noModeRunning: 'Tones come from the machine. Stop it and tap to find modes.',
    foldDetail: 'folded?',
    foldedDetail: (frequency: string) => `seen at ${frequency}`,
    caption:
      'Left: what the structure does; the longer the point, the more it amplifies; the band across the rails is bandwidth, fading as the frequency is unsure. Right: what shakes it. Tap a mark to see the pair.',
    sentence: (modes: string, worst: string) =>
      `Ladder of frequencies. ${modes}${worst === '' ? '' : ` ${worst}`}`,
    modesSaid: (list: string) => (list === '' ? 'No mode.' : `Modes on the left at ${list}.`),
    forcingsSaid: (n: number) =>
      n === 0 ? 'No sources entered.' : `${count(n, 'forcing', 'forcings')} on the right.`,
    hidden: (n: number) =>
      `${count(n, 'mark is', 'marks are')} without a label here: zoom in, or see the list.`,
    changed: 'as tried',
  },
  pair: {
    list: 'Modes and forcings',
    none: 'No sources entered for this reading yet.',
    noneNote: 'Enter what shakes it, and the verdict follows: people, a machine, wind, traffic.',
    against: (forcing: string, mode: string) => `${forcing} against the mode at ${mode}`,
    ratio: 'ratio',
    rowDetail: (ratio: string, mode: string, times: string) =>
      `ratio ${ratio} to the mode at ${mode}, amplified ${times}`,
    toneFits: (tone: string, isFolded: boolean) =>
      isFolded ? `its folded image fits the tone seen at ${tone}` : `the tone at ${tone} fits`,
    amplifies: (kind: AmplificationKind, times: string) => `The mode amplifies ${AMPLIFIED[kind]} ${times}`,
    amplified: (kind: AmplificationKind) => `${AMPLIFIED[kind]} amplified`,
    times: (interval: string) => `${interval} times`,
    limited: 'with the cycles it has to build up',
    stopped: 'Found at rest, held against the running machine: it may shift when running.',
    mode: (frequency: string, damping: string) => `Mode at ${frequency}, damping ${damping}.`,
    pace: 'Show a pace to walk it by',
    modeAlone: 'No forcing is held against it.',
    toneAlone: (tone: string) => `A measured tone at ${tone}.`,
    image: (frequency: string) => `This recording would see it folded, at ${frequency}.`,
    more: (n: number) => `Show ${n} more`,
    fewer: 'Show fewer',
    pick: 'Tap a mark on the ladder.',
    faceValue: (verdict: string) => `${verdict} if what is seen is no folded image`,
    ownLimits: 'Verdicts go by limits set on this phone, not by the usual ones.',
    seeLimits: 'See the limits',
  },
  trying: {
    open: 'Try a change',
    title: 'Try a change',
    close: 'Done trying',
    reset: 'Back to as measured',
    note: 'Worked out for one mode by itself: frequency goes with the root of stiffness over mass. Measure again after the change.',
    ofMode: (mode: string) => `of the mode at ${mode}`,
    change: (kind: WayOutKind) => CHANGES[kind],
    speedOf: (name: string) => `Speed of ${name}`,
    times: (factor: string) => `× ${factor}`,
    asMeasured: 'as measured',
    nowAt: (now: string, before: string) =>
      now === before ? `Mode at ${now}, as measured.` : `Mode at ${now}, was ${before}.`,
    nothingNear: 'No forcing is held against this mode.',
    worse: (list: string) => `Made worse: ${list}.`,
  },
  waysOut: {
    title: 'Ways out',
    others: (n: number) => `For ${count(n, 'more pair', 'more pairs')}`,
    none: 'Nothing to move apart: no pair is coincident or close.',
    impractical: 'more than is commonly built',
    sideEffects: (list: string) => `Brings closer: ${list}.`,
  },
  specialistMore: (n: number) => count(n, 'more reason', 'more reasons'),

  plots: {
    keys: 'Arrow keys move the cursor, plus and minus zoom, 0 shows the whole.',
    closer: 'Closer',
    wider: 'Wider',
    whole: 'Whole range',
    loading: 'Working out the pictures from the raw samples…',
    failed: 'The pictures could not be worked out.',
    axis: (name: string) => `axis ${name}`,
    lines: 'Lines shown',
    numbers: 'Numbers behind the picture',
  },
  spectrum: {
    title: 'Spectrum',
    sentence: (strongest: string, resolution: string) =>
      `Amplitude of each axis against frequency. Strongest at ${strongest}. Resolution ${resolution}.`,
    x: (unit: string) => `frequency, ${unit}`,
    y: (unit: string) => `amplitude, ${unit}`,
    note: (window: string, resolution: string, averages: string) =>
      `${window.charAt(0).toUpperCase()}${window.slice(1)} window, resolution ${resolution}, ${averages}. Hatched: this recording could not see it.`,
    averages: (said: string) => (said === '1' ? '1 average' : `${said} averages`),
    head: ['Frequency', 'Amplitude', 'What it is'],
    mode: 'mode',
    tone: 'tone',
    log: 'Logarithmic',
    linear: 'Linear',
    scale: 'Amplitude scale',
  },
  trace: {
    title: 'Time trace',
    sentence: (duration: string, peak: string, taps: number) =>
      `Acceleration of each axis over ${duration}, gravity removed. Largest ${peak}.${taps > 0 ? ` ${count(taps, 'tap', 'taps')} marked.` : ''}`,
    x: 'time, s',
    y: (unit: string) => `acceleration, ${unit}`,
    head: ['Axis', 'Largest', 'Rms'],
    tap: (n: number) => `tap ${n}`,
  },
  ringDown: {
    title: 'Ring-downs',
    choose: 'Ring-down',
    tapName: (n: number, at: string) => `Tap ${n}, at ${at}`,
    previous: 'Tap before',
    following: 'Next tap',
    name: (n: number) => `Ring-down ${n}`,
    sentence: (n: number, peak: string, residual: string) =>
      `Ring-down ${n}: measured points and the fitted curve. Largest ${peak}; what the fit leaves is ${residual} rms.`,
    residualName: (n: number) => `Residual of ring-down ${n}`,
    residualSentence: (residual: string) => `Measured minus fitted, ${residual} rms.`,
    measured: 'measured',
    fitted: 'fitted',
    residual: 'residual',
    x: 'time after the tap, s',
    y: (unit: string) => `along the mode, ${unit}`,
    residualY: 'residual',
    head: ['Tap', 'At', 'Largest', 'Residual rms', 'Share explained'],
  },
  pass: {
    title: 'Pass through resonance',
    sentence: (from: string, to: string, peak: string) =>
      `Amplitude against frequency while slowing from ${from} to ${to}, largest at ${peak}.`,
    sweep: (rate: string, severity: string) =>
      `Sweep rate ${rate}, ${severity} of what lets the resonance build up fully.`,
    slow: 'The machine slowed gently enough for the resonance to build up.',
    fast: 'It slowed too fast for the resonance to build up fully; the fit takes that into account.',
    head: ['Frequency', 'Measured', 'Fitted'],
    measured: 'measured',
    fitted: 'fitted',
  },
  origins: {
    title: 'Whose vibration it is',
    take: 'Take a reading at this spot with the machine off, and each tone is told to be this machine’s or to come from elsewhere.',
    against: (isRunning: boolean, when: string) =>
      isRunning
        ? `Against the reading with the machine off, ${when}.`
        : `Against the reading with the machine running, ${when}.`,
    open: 'Open it',
  },
  levels: {
    title: 'How strong the shaking is',
    none: 'No level could be worked out from this recording.',
    tapNote:
      'Taps are blows of the hand: levels say nothing about service. Take a running or ambient reading for them.',
    leftOut: 'Folded or undecided tones are left out of velocity and displacement.',
    peak: 'Peak acceleration',
    rms: 'Rms acceleration',
    velocityRms: 'Rms velocity',
    velocityPeak: 'Peak velocity',
    displacement: 'Peak displacement',
    band: (band: string) => `In the band seen, ${band}.`,
    criteria: 'Against published guidance',
    noSpot: 'Name the spot, and these are held against published guidance for what it is.',
    noClass: 'The guidance needs to know more of the spot.',
    sayClass: 'Say what it is',
    wasLoaded: 'The loading that the guidance presumes was there during this reading',
    head: ['Quantity', 'Value'],
  },
  doubts: {
    title: 'Doubts',
    none: 'None. Trust is good.',
    todo: 'What to do',
  },
  sensor: {
    title: 'What the sensor gave',
    rows: {
      source: 'Samples from',
      phone: 'Browser',
      samples: 'Samples',
      duration: 'Duration',
      rate: 'True rate',
      timing: 'Time base',
      scatter: 'Scatter of the stamps',
      gaps: 'Gaps',
      repeats: 'Repeated samples',
      step: 'Rounding step',
      noise: 'Noise',
      clipped: 'Clipped samples',
      band: 'Band it can see',
      gravity: 'Gravity at rest',
      ended: 'How it ended',
    },
    wholeRecording: 'whole',
    noStep: 'none found',
    trueShare: (percent: string) => `${percent} of it true`,
    timing: (model: TimingFacts['model']) => TIMINGS[model],
    sources: {
      accelerometer: 'motion sensor, its own time stamps',
      devicemotion: 'motion events of the browser',
      file: 'a file',
      practice: 'practice rig',
    },
  },
  sources: {
    title: 'What shakes it',
    add: 'Add what shakes it',
    none: 'Nothing entered yet.',
    gives: (n: number) => count(n, 'forcing', 'forcings'),
  },
  circumstances: {
    title: 'Circumstances',
    rows: {
      mounting: 'Phone',
      surface: 'On',
      excitation: 'Excited by',
      machineState: 'Machine',
      peopleOnIt: 'People on it',
      load: 'Load',
      temperatureC: 'Temperature',
      direction: 'Direction',
      speedRpm: 'Speed',
    },
    unknown: 'not said',
    words: {
      laid: 'laid on',
      strapped: 'strapped',
      putty: 'on putty',
      clamp: 'clamped',
      magnet: 'on a magnet',
      tube: 'a tube',
      plate: 'a plate',
      floor: 'the floor',
      knuckle: 'knuckle',
      mallet: 'mallet',
      'heel-drop': 'heel drop',
      'bounce-and-stop': 'bounce and stop',
      'pull-and-release': 'pull and release',
      machine: 'machine',
      ambient: 'what is there',
      off: 'off',
      running: 'running',
      slowing: 'slowing down',
      none: 'none',
      hands: 'hands',
      people: 'people',
    } as Readonly<Record<string, string>>,
  },
  notes: {
    title: 'Name, notes, photos',
    label: 'Name of this reading',
    notes: 'Notes',
    notesHint: 'Kept as you type.',
    photo: 'Add a photo',
    photoAlt: (n: number) => `Photo ${n} of this spot`,
    removePhoto: (n: number) => `Remove photo ${n}`,
    photoRemoved: 'Photo removed.',
    photoFailed: 'This picture could not be read.',
  },
  conflict: {
    title: (field: string) => `Two versions of the ${field}`,
    note: 'They were written unknown to each other. Choose one; the other stays in the history.',
    by: (device: string, at: string) => `${device}, ${at}`,
    here: 'this device',
    keep: (value: string) => `Keep “${value}”`,
    empty: 'empty',
    fields: {
      label: 'name',
      notes: 'notes',
      spot: 'spot',
      asset: 'asset',
      site: 'site',
      presumedLoading: 'whether the presumed loading was there',
    } as Readonly<Record<string, string>>,
    yes: 'yes',
    no: 'no',
  },
  redo: {
    title: 'Analysis',
    made: (version: number, at: string) => `Analysis version ${version}, ${at}.`,
    madeAgain: (version: number, at: string) => `Redone with analysis version ${version}, ${at}.`,
    procedure: 'Read it as',
    auto: 'Decide by the data',
    timing: 'Time base',
    timings: {
      auto: 'Decide by the data',
      stamps: 'Take the stamps as true',
      clock: 'Steady clock behind late stamps',
    },
    run: 'Analyse again',
    working: 'Analysing the stored samples…',
    cancel: 'Cancel',
    beside: 'Old and new side by side',
    head: ['', 'Kept', 'New'],
    same: 'The same numbers.',
    keep: 'Keep the new analysis',
    drop: 'Leave as it is',
    failed: 'The analysis gave no answer',
    rows: {
      procedure: 'Procedure',
      trust: 'Trust',
      frequency: 'Frequency',
      damping: 'Damping',
      doubts: 'Doubts',
      timing: 'Time base',
      version: 'Version',
    },
    mode: (n: number) => `mode ${n}`,
    nothing: 'none',
  },
  history: {
    title: 'History',
    recorded: (version: string) => `Recorded, with version ${version} of the app`,
    set: (field: string, value: string) => `${field}: “${value}”`,
    cleared: (field: string) => `${field} cleared`,
    trashed: 'moved to the trash',
    restored: 'put back from the trash',
    redone: (version: number) => `analysis redone, version ${version} kept`,
  },
} as const;

/** "tap test · 5 taps · 32 s": what kind of reading, in a few words. */
export const readingKind = (analysis: Analysis): string =>
  [
    PROCEDURES[analysis.procedure],
    ...(analysis.tapTimesS.length > 0 ? [count(analysis.tapTimesS.length, 'tap', 'taps')] : []),
    `${Math.round(analysis.recording.durationS)} s`,
  ].join(' · ');
