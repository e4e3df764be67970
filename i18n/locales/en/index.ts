import animals from './animals.json'
import common from './common.json'
import errors from './errors.json'
import payments from './payments.json'
import sheet from './sheet.json'
import names from './names.json'
import notices from './notices.json'
import people from './people.json'
import states from './states.json'

/** Every text that the server says. A room is added here when something outside a page speaks its words. */
export default { ...animals, ...common, ...errors, ...sheet, ...names, ...payments, ...notices, ...people, ...states }
