// Writes files as C++ character arrays: node embed.mjs OUT.cpp NAME=FILE ...
import { readFileSync, writeFileSync } from 'node:fs';

const [out, ...files] = process.argv.slice(2);

function literal(bytes) {
  let text = '';
  for (const byte of bytes) {
    const plain = byte >= 0x20 && byte < 0x7f && byte !== 0x22 && byte !== 0x5c && byte !== 0x3f;
    text += plain ? String.fromCharCode(byte) : '\\' + byte.toString(8).padStart(3, '0');
  }
  return text;
}

let source = '// Generated from bench/report/web.\n#include "bench/report/embedded.hpp"\n\nnamespace cistern {\n';
for (const file of files) {
  const [name, path] = file.split('=');
  const bytes = readFileSync(path);
  const lines = [];
  for (let at = 0; at < bytes.length; at += 8000) lines.push(`    "${literal(bytes.subarray(at, at + 8000))}"`);
  source += `std::string_view ${name}() {\n  static constexpr char bytes[] =\n${lines.join('\n')};\n  return {bytes, sizeof bytes - 1};\n}\n`;
}
writeFileSync(out, source + '}  // namespace cistern\n');
