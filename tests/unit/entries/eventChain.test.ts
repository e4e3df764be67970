import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { chainEvent, commitment, eventHash, type NewEvent } from '../../../server/services/entries/eventChain'

const event = (rest: Partial<NewEvent> = {}): NewEvent => ({
  entryId: 7, entryUid: '0193b8a0-0000-7000-8000-000000000001', kind: 'submit', fromState: 'certified', toState: 'in_review',
  at: new Date('2026-03-02T10:00:00.250Z'), actor: { userId: 3, uid: '0193b8a0-0000-7000-8000-000000000002' }, args: { net16: 2706 }, texts: {}, ...rest,
})
const salts = () => new Uint8Array(16).fill(7)

describe('the chain of an entry’s events', () => {
  it('hashes the canonical text of RFC 8785: members sorted, no white space', () => {
    const text = '{"actor":"0193b8a0-0000-7000-8000-000000000002","args":{"net16":2706},"at":"2026-03-02T10:00:00.250Z","commitments":{},'
      + '"entry":"0193b8a0-0000-7000-8000-000000000001","from":"certified","kind":"submit","prev":null,"seq":1,"to":"in_review"}'
    expect(chainEvent(event(), null, salts).row.hash).toBe(createHash('sha256').update(text, 'utf8').digest('hex'))
  })

  it('numbers events and binds each to the one before it', () => {
    const first = chainEvent(event(), null, salts)
    const second = chainEvent(event({ kind: 'return' }), first.end, salts)
    expect([first.row.seq, second.row.seq]).toEqual([1, 2])
    expect([first.row.prev_hash, second.row.prev_hash]).toEqual([null, first.row.hash])
    const elsewhere = chainEvent(event({ kind: 'return' }), { seq: 1, hash: 'f'.repeat(64) }, salts)
    expect(elsewhere.row.hash).not.toBe(second.row.hash)
  })

  it('holds a text by its salted commitment alone, so that erasing the text leaves the hash whole', () => {
    const { row, texts } = chainEvent(event({ texts: { comment: 'Ulla Thorn wrote this' } }), null, salts)
    expect(`${row.args}${row.commitments}${row.hash}`).not.toContain('Ulla')
    expect(JSON.parse(row.commitments)).toEqual({ comment: commitment(texts[0]!.salt, 'Ulla Thorn wrote this') })
    expect(commitment('01', 'a')).not.toBe(commitment('02', 'a'))
  })

  it('changes with every part of the event', () => {
    const whole = { entry: 'e', seq: 1, at: '2026-03-02T10:00:00.250Z', kind: 'k', from: 'a', to: 'b', actor: 'u', args: {}, commitments: {}, prev: 'p' }
    const hashes = [whole, ...Object.keys(whole).map(key => ({ ...whole, [key]: key === 'seq' ? 2 : key === 'args' || key === 'commitments' ? { x: 1 } : 'other' }))].map(eventHash)
    expect(new Set(hashes).size).toBe(hashes.length)
  })
})
