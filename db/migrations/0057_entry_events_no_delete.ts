import { refuse, trigger } from '../columns'

export const { up, down } = trigger('entry_events_no_delete', 'BEFORE DELETE', 'entry_events', refuse('append_only'))
