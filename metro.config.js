const path = require('node:path');
const { getDefaultConfig } = require('expo/metro-config');

const config = getDefaultConfig(__dirname);

// The offline barcode decoder ships as a WebAssembly file beside the bundle.
config.resolver.assetExts.push('wasm');

// expo-camera loads `barcode-detector` when the browser has no detector of its own, and that package fetches its decoder from
// a CDN: without network it never fires and says nothing. Our module of the same shape brings the decoder along.
const offlineDetector = path.join(__dirname, 'components', 'scan', 'barcodeDetector.ts');
config.resolver.resolveRequest = (context, moduleName, platform) =>
  moduleName === 'barcode-detector'
    ? { type: 'sourceFile', filePath: offlineDetector }
    : context.resolveRequest(context, moduleName, platform);

module.exports = config;
