import { defineStore } from 'pinia'
import { reportsClient, type ReportDetail, type ReportFields } from '~/services/reportsClient'

/** The report that is open, with its revisions; after each change it is read again. */
export const useReportStore = defineStore('report', () => {
  const reportId = ref<number | null>(null)
  const { value: detail, error, load } = useLoad<ReportDetail | null>(async () => reportId.value === null ? null : reportsClient.read(reportId.value))

  /** Opens a report; one that is open already is only read again. */
  async function open(id: number): Promise<void> {
    if (reportId.value !== id) {
      reportId.value = id
      detail.value = null
    }
    await load()
  }

  async function change(fields: ReportFields & { version: number }): Promise<void> {
    if (reportId.value === null) throw new Error('No report is open.')
    await reportsClient.change(reportId.value, fields)
    await load()
  }

  return { reportId, detail, error, load, open, change }
})
