/** What a state means to the person: quiet (nothing to say), good, attention (answer it), stop (not fit), waiting (still to come). */
export const TONES = ['quiet', 'good', 'attention', 'stop', 'waiting'] as const
export type Tone = typeof TONES[number]
