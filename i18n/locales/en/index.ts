import common from './common.json'
import errors from './errors.json'
import states from './states.json'

/** Every text that the server says. A room is added here when something outside a page speaks its words. */
export default { ...common, ...errors, ...states }
