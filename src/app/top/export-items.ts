import type { MenuItem } from '../ui/Menu.svelte';

export const exportItems = (): MenuItem[] => [];
