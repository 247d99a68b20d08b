import { readFileSync, readdirSync } from 'node:fs'
import { JSDOM } from 'jsdom'
import { describe, expect, it } from 'vitest'

const folder = 'templates/report/styles'
const styles = readdirSync(folder).filter(name => name.endsWith('.css')).map(name => readFileSync(`${folder}/${name}`, 'utf8')).join('\n')

describe('the style sheet of the report', () => {
  it('sets the size of a figure, and leaves the windows within it their own, which clip the tints to their panel', () => {
    const { window } = new JSDOM(`<style>${styles}</style><figure class="figure-full"><svg id="figure"><svg id="window" overflow="hidden"></svg></svg></figure>`)
    const styleOf = (id: string) => window.getComputedStyle(window.document.getElementById(id)!)
    expect(styleOf('figure').width).toBe('100%')
    expect(styleOf('window').width).not.toBe('100%')
    expect(styleOf('window').overflow).not.toBe('visible')
  })
})
