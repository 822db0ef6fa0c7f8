// npm run dev: the same set-up as npm start, with the development server instead of a production build.
import { serve } from './steps/serve.mjs'

await serve('dev')
