import '../lib/strict-parser.ts'
import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { watchForInput } from '../lib/person-active.ts'
import '../styles/app.css'
import './common.css'
import { App } from './providers.tsx'

watchForInput()
createRoot(document.getElementById('root')!).render(
  <StrictMode>
    <App />
  </StrictMode>,
)
