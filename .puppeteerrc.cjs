// The browser is found by src/publish/, so that an install never depends on a download.
module.exports = { skipDownload: true }
