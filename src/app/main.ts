import { mount } from 'svelte';
import App from './App.svelte';
import { keepProgram } from './offline/register.ts';
import { installTheme } from './theme.ts';

installTheme();
keepProgram();
const target = document.getElementById('app');
if (target) mount(App, { target });
