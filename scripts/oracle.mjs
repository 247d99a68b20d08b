// npm run oracle -- [--count 3000] [--family 'tuned hump'] [--start 0] [--orders 2-9] [--show 5]: holds the engine against exact arithmetic on seeded loops.
import { bundle } from './bundle.mjs'

await import(await bundle('scripts/oracle/run.ts', 'oracle'))
