import { config } from 'zod/mini';

config({ jitless: true });
