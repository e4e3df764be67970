import { refuse, trigger } from '../columns'

export const { up, down } = trigger('ledger_no_delete', 'BEFORE DELETE', 'ledger', refuse('append_only'))
