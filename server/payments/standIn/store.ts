import { closeSync, fsyncSync, mkdirSync, openSync, readdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs'
import path from 'node:path'

/**
 * What the stand-in keeps, one JSON file a thing, each written whole and synced: it must forget as little as the real
 * service does when its process is killed.
 */
export class Store {
  readonly #folder: string
  constructor(folder: string) {
    this.#folder = folder
  }

  #file(kind: string, id: string): string {
    return path.join(this.#folder, kind, `${id.replace(/[^\w-]/g, '_')}.json`)
  }

  read<T>(kind: string, id: string): T | undefined {
    try {
      return JSON.parse(readFileSync(this.#file(kind, id), 'utf8')) as T
    }
    catch (error) {
      if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined
      throw error
    }
  }

  write(kind: string, id: string, value: unknown): void {
    const file = this.#file(kind, id)
    mkdirSync(path.dirname(file), { recursive: true })
    const unfinished = `${file}.${process.pid}`
    const handle = openSync(unfinished, 'w', 0o600)
    try {
      writeFileSync(handle, JSON.stringify(value))
      fsyncSync(handle)
    }
    finally {
      closeSync(handle)
    }
    renameSync(unfinished, file)
  }

  list<T>(kind: string): T[] {
    try {
      return readdirSync(path.join(this.#folder, kind)).filter(name => name.endsWith('.json')).sort()
        .map(name => JSON.parse(readFileSync(path.join(this.#folder, kind, name), 'utf8')) as T)
    }
    catch (error) {
      if ((error as NodeJS.ErrnoException).code === 'ENOENT') return []
      throw error
    }
  }
}
