import { bootstrapApplication } from '@angular/platform-browser';
import * as z from 'zod';
import { App } from './app/app';
import { appConfig } from './app/app.config';

// The content security policy allows no eval, which zod's compiled parsers would use.
z.config({ jitless: true });

void bootstrapApplication(App, appConfig);
