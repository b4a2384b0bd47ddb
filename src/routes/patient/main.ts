import { mount } from 'svelte';
import PatientApp from './PatientApp.svelte';

mount(PatientApp, { target: document.getElementById('patient')! });
