import { refuse, trigger } from '../columns'

export const { up, down } = trigger('ledger_no_update', 'BEFORE UPDATE', 'ledger', refuse('append_only'))
