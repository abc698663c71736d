/** The API reference in the service's own colours and lines; the page itself is swagger-ui's. */
export const REFERENCE_LOOK = `
.swagger-ui .topbar { display: none }
body { background: #f4f3ed }
.swagger-ui, .swagger-ui .info .title, .swagger-ui .opblock-tag, .swagger-ui .opblock .opblock-summary-path,
.swagger-ui .opblock .opblock-summary-description, .swagger-ui table thead tr td, .swagger-ui table thead tr th,
.swagger-ui .response-col_status, .swagger-ui section.models h4 {
  color: #132136; font-family: Inter, system-ui, sans-serif }
.swagger-ui .info .title small, .swagger-ui .info .title small.version-stamp { background: #132136; border-radius: 0 }
.swagger-ui .info a, .swagger-ui .info .link { color: #1c5991 }
.swagger-ui .scheme-container { background: none; box-shadow: none; border-block: 1px solid #132136 }
.swagger-ui .opblock-tag { border-bottom: 1px solid #132136 }
.swagger-ui .opblock[class] { background: none; border: 0; border-bottom: 1px solid #c6d4dd; border-radius: 0;
  box-shadow: none; margin: 0 }
.swagger-ui .opblock[class] .opblock-summary { border: 0 }
.swagger-ui .opblock[class] .opblock-summary-method { background: none; border-radius: 0; color: #132136;
  text-align: left; text-shadow: none }
.swagger-ui .opblock .opblock-section-header { background: #ecebe4; box-shadow: none }
.swagger-ui .btn[class] { background: none; border: 1px solid #132136; border-radius: 0; box-shadow: none;
  color: #132136 }
.swagger-ui .btn.authorize[class] svg { fill: #132136 }
.swagger-ui .btn.execute { background: #132136; color: #f4f3ed }
.swagger-ui section.models { border: 0; border-top: 1px solid #132136; border-radius: 0 }
`
