import { BarcodeDetector, prepareZXingModule } from 'barcode-detector/ponyfill';
import { Asset } from 'expo-asset';
import decoder from 'zxing-wasm/reader/zxing_reader.wasm';

// Metro gives expo-camera this module in place of the package `barcode-detector` (see metro.config.js), so that
// scanning works without network: the decoder is served with the app instead of fetched from a CDN.
prepareZXingModule({
  overrides: {
    locateFile: (name: string, folder: string) => (name.endsWith('.wasm') ? Asset.fromModule(decoder).uri : `${folder}${name}`),
  },
});

export { BarcodeDetector };
