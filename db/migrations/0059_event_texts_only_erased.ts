import { refuse, trigger } from '../columns'

export const { up, down } = trigger('event_texts_only_erased', 'BEFORE UPDATE', 'event_texts', `IF NOT (NEW.event_id = OLD.event_id AND NEW.field = OLD.field AND NEW.body IS NULL) THEN ${refuse('append_only')}; END IF`)
