export { ExportEntryButton } from './components/export-dialog.tsx'
export { ExportForm } from './components/export-form.tsx'
export { ExportList } from './components/export-list.tsx'
