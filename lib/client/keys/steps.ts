export const stepKeys = {
  root: ['steps'] as const,
  form: (step: 'screen' | 'hold' | 'trial' | 'decision', episodeId: string, amend: string | null) =>
    [...stepKeys.root, step, episodeId, amend] as const,
}
