/** Version of the analysis: raised whenever a result may differ from that of an earlier one. Stored with every result. */
export const ENGINE_VERSION = '1.1.0'
