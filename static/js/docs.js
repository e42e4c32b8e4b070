// Shows the OpenAPI document. "Try it out" is off: a document for reading must not store anything.
const place = document.getElementById("api");
SwaggerUIBundle({
  url: place.dataset.document,
  domNode: place,
  deepLinking: true,
  supportedSubmitMethods: [],
  validatorUrl: null,
});
