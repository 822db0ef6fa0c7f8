// npm start: from a bare clone to the running product, doing all its own set-up.
import { serve } from './steps/serve.mjs'

await serve('start')
