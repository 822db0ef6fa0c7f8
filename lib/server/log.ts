import { pino } from 'pino'

/** What goes wrong on the server, on its standard error; never what people typed. */
export const log = pino({ name: 'halfsplit' }, pino.destination(2))
