/*
 * Runs before everything else, on a fresh clone too: checks the version of Node.js and installs what is missing.
 * Uses nothing but Node itself, and syntax that any Node can parse, so that an old one gets a sentence and no stack trace.
 */
'use strict';
var fs = require('fs');
var path = require('path');
var child = require('child_process');

var root = path.join(__dirname, '..', '..');

/** A sentence if this Node is too old, else undefined. The bounds are those of the build tool. */
function nodeTooOld(version) {
  var parts = String(version).replace(/^v/, '').split('.');
  var major = Number(parts[0]);
  var minor = Number(parts[1]);
  var fits = (major === 20 && minor >= 19) || (major === 22 && minor >= 12) || major > 22;
  if (fits) return undefined;
  return (
    'Spooltable needs Node.js 20.19 or newer (of the 22 series: 22.12); this is ' +
    version +
    '. Install a newer one, then try again.'
  );
}

/** Why the installed packages do not fit the lock, else undefined. Both are parsed lock files; `installed` may be undefined. */
function notInstalled(lock, installed) {
  if (!installed || !installed.packages) return 'nothing is installed yet';
  var names = Object.keys(lock.packages);
  for (var i = 0; i < names.length; i++) {
    var name = names[i];
    var wanted = lock.packages[name];
    var have = installed.packages[name];
    if (name === '' || (!have && wanted.optional)) continue;
    if (!have) return name + ' is missing';
    if (have.version !== wanted.version || have.integrity !== wanted.integrity) return name + ' differs from the lock';
  }
  return undefined;
}

function readJson(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'));
  } catch (error) {
    void error;
    return undefined;
  }
}

function install(why) {
  console.log('Installing packages (' + why + ') …');
  // Development packages are what builds and serves the editor, whatever NODE_ENV says.
  var args = ['ci', '--include=dev', '--no-audit', '--no-fund'];
  var npm = process.env.npm_execpath;
  var options = { cwd: root, stdio: ['ignore', 'inherit', 'inherit'] };
  var done = npm
    ? child.spawnSync(process.execPath, [npm].concat(args), options)
    : child.spawnSync('npm', args, { cwd: root, stdio: options.stdio, shell: process.platform === 'win32' });
  if (done.status !== 0) {
    console.error('The packages could not be installed: see the message of npm above, mend that, then try again.');
    process.exit(1);
  }
}

function main() {
  var old = nodeTooOld(process.version);
  if (old) {
    console.error(old);
    process.exit(1);
  }
  var lock = readJson(path.join(root, 'package-lock.json'));
  if (!lock) {
    console.error('package-lock.json is missing or damaged: restore it from the repository, then try again.');
    process.exit(1);
  }
  var why = notInstalled(lock, readJson(path.join(root, 'node_modules', '.package-lock.json')));
  if (why) install(why);
  if (process.argv[2]) goOn(process.argv[2], process.argv.slice(3));
}

/** The process that started this one, and, where the system tells, the one above: npm starts a shell in between. */
function elders() {
  try {
    var stat = fs.readFileSync('/proc/' + process.ppid + '/stat', 'utf8');
    return process.ppid + ' ' + stat.slice(stat.lastIndexOf(')')).split(' ')[2];
  } catch (error) {
    void error;
    return String(process.ppid);
  }
}

/** Runs the next script as a child, and ends with it; ends it when npm, which started this one, is gone. */
function goOn(script, args) {
  var next = child.spawn(process.execPath, [path.join(root, script)].concat(args), { stdio: 'inherit' });
  next.on('exit', function (code) {
    process.exit(code === null ? 1 : code);
  });
  ['SIGINT', 'SIGTERM', 'SIGHUP'].forEach(function (signal) {
    process.on(signal, function () {
      next.kill(signal);
    });
  });
  var started = elders();
  setInterval(function () {
    if (elders() !== started) next.kill('SIGTERM');
  }, 500).unref();
}

module.exports = { nodeTooOld: nodeTooOld, notInstalled: notInstalled };
if (require.main === module) main();
