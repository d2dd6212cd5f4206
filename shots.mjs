import { chromium } from "playwright-core";
const origin="http://127.0.0.1:4640";
const browser = await chromium.launch({ executablePath:"/usr/bin/chromium", args:["--headless","--no-sandbox","--disable-gpu","--disable-quic","--no-first-run","--disable-background-networking","--disable-component-update","--disable-sync"]});
const who={dell:"dell.farrow",maren:"maren.oake",hester:"hester.lund",tobin:"tobin.ashe",ilse:"ilse.tarrant",ruben:"ruben.vale",none:null};
const shots=process.argv.slice(2).map(s=>s.split("|")); // who|path|name|width|scheme
const byWho={};
for (const [w,path,name,width="1280",scheme="light"] of shots){
  const key=w+width+scheme;
  if(!byWho[key]){const ctx=await browser.newContext({viewport:{width:+width,height:+width<500?740:900},colorScheme:scheme,hasTouch:+width<500});const page=await ctx.newPage();
    page.on("console",m=>{if(m.type()==="error")console.log(name,"console:",m.text())});page.on("pageerror",e=>console.log(name,"pageerror",e.message));
    if(who[w]){await page.goto(`${origin}/auth/start?hint=${who[w]}`);await page.waitForLoadState("networkidle");console.log(w,page.url());}
    byWho[key]=page;}
  const page=byWho[key];
  const r=await page.goto(origin+path);await page.waitForLoadState("networkidle");
  console.log(r.status(),path,await page.title());
  await page.screenshot({path:`/tmp/shots-season/${name}.png`,fullPage:true});
}
await browser.close();
