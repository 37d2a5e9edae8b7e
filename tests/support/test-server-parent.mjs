// A parent that starts one test server and tells its process id; the test then kills it without a chance to clean up.
const [supervisorFile, entry, seed, message] = process.argv.slice(2);
const { Supervisor } = await import(supervisorFile);
const supervisor = new Supervisor({ entry });
supervisor.announce(JSON.parse(seed));
supervisor.launch(JSON.parse(message), { sampleInstances: [], landingNode: null, servedSeq: 0 });
const timer = setInterval(() => {
  if (supervisor.get(JSON.parse(seed).id)?.state !== "running") return;
  clearInterval(timer);
  process.send(supervisor.getPid(JSON.parse(seed).id));
}, 50);
