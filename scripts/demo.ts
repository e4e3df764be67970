import type { HartrollConfig } from '../server/config'

/** Fills an empty database of our own with the invented society. */
export async function fillWithDemo(_config: HartrollConfig, say: (line: string) => void): Promise<void> {
  say('Demo data: not there yet')
}
