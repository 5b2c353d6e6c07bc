import * as z from 'zod';

// The content security policy lets nobody make code at run time; zod then checks without it. Loaded
// before everything else (angular.json, polyfills), because schemas ask when they are made.
z.config({ jitless: true });
