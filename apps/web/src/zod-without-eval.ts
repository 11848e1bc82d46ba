import * as z from 'zod';

// zod probes `new Function` when an object schema is made, and the content security policy reports that.
// A module of its own, imported first, so that it runs before any module makes a schema.
z.config({ jitless: true });
