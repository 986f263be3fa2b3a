import { mount } from 'svelte'
import App from './App.svelte'
import './style.css'
import './describe/describe.css'

mount(App, { target: document.getElementById('window')! })
