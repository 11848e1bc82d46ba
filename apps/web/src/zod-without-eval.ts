import * as z from 'zod';

// zod probes `new Function` when an object schema is made, and the content security policy reports that. The build loads this
// file as a script of its own before the application's (angular.json, polyfills), so it runs before any schema is made.
z.config({ jitless: true });
