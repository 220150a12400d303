import { mount } from 'svelte';
import App from './App.svelte';
import { installTheme } from './theme.ts';

installTheme();
const target = document.getElementById('app');
if (target) mount(App, { target });
