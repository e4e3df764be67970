import { refuse, trigger } from '../columns'

export const { up, down } = trigger('event_texts_no_delete', 'BEFORE DELETE', 'event_texts', refuse('append_only'))
