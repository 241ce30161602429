import { launchBrowser, takeSeat, signIn, axeViolations, DESKTOP, PHONE } from './tests/support/browser';
const origin = 'http://127.0.0.1:3000';
const [who='owner@works.example', tag='w', size='desktop', scheme='light'] = process.argv.slice(2);
const b = await launchBrowser();
const seat = await takeSeat(b, { origin, viewport: size==='phone'?PHONE:DESKTOP, colorScheme: 'light' });
await signIn(seat.page, who, 'measure twice');
if (scheme==='dark') await seat.context.addCookies([{name:'shift',value:'night',url:origin}]);
const shot = async (name: string) => { await seat.page.waitForTimeout(300); await seat.page.screenshot({ path: `/tmp/wiretag/shots/${tag}-${name}.png`, fullPage: true }); const v = await axeViolations(seat.page); if (v.length) console.log(name, v.join('\n   ')); const w = await seat.page.evaluate(()=>document.documentElement.scrollWidth-innerWidth); if (w>0) console.log(name,'overflow',w); };
await seat.page.goto('/bench'); await shot('bench');
const links = await seat.page.$$eval('ul a[href^="/orders/"]', (as) => as.map((a) => [(a as HTMLAnchorElement).getAttribute('href'), a.closest('li')?.innerText.replace(/\n/g,' ').slice(0,80)]));
console.log(links.map(l=>l.join(' ')).join('\n'));
await seat.page.goto('/orders?show=all'); await shot('orders');
for (const p of ['builds','shops','settings','turnaround','orders/new']) { const r=await seat.page.goto('/'+p); console.log(p, r?.status()); await shot(p.replace('/','-')); }
const cutting = links.find(l=>/Cut, post/.test(String(l[1])))?.[0] ?? links[0]?.[0];
for (const t of ['sizes','readings','parts','price','papers','history']) { const r=await seat.page.goto(`${cutting}/${t}`); console.log(t, r?.status()); await shot('order-'+t); }
console.log(seat.faults.join('\n'));
await b.close();
