import { linkIn, TestMailServer } from '../../api/testing/mail-server.js';
import { expectAccessible } from './fixtures/axe.js';
import { expect, openScreen, test } from './fixtures/fixtures.js';
import { PEOPLE, SHED } from './fixtures/mill-facts.js';
import { DeskSignIn } from './pages/desk-sign-in.js';
import { FloorSignIn } from './pages/floor-sign-in.js';

const CHOSEN = 'twenty looms at night';

test('an invitation goes by mail: link, password, signed in; forgotten, it comes again @set-up', async ({
  browser,
  mill,
  desk,
}) => {
  test.setTimeout(150_000);
  const mail = await TestMailServer.start({ account: { user: 'shedbeat', password: 'a mail password' } });
  const { page } = desk;
  const field = (name: string) => page.getByRole('textbox', { name, exact: true });
  await new DeskSignIn(page).signIn('manager');

  await test.step('mail is set up, wrong at first, and the test letter says so', async () => {
    await page.goto('/set-up/mail');
    await expect(page.getByText('No mail server: letters are kept here')).toBeVisible();
    await expectAccessible(page, 'mail');
    await field('Server').fill('https://localhost');
    await expect(page.getByText('A server’s name alone, such as smtp.mill.example')).toBeVisible();
    await field('Server').fill('localhost');
    await page.getByLabel('Security').selectOption({ label: 'none: letters and password go readable' });
    await field('Port').fill(String(mail.port));
    await field('Sender’s address').fill('shedbeat@mill.example');
    await field('User').fill('shedbeat');
    await page.getByLabel('Password', { exact: true }).fill('not this one');
    await page.getByRole('button', { name: 'Save the mail settings' }).click();
    await expect(page.getByText('Letters go out by localhost')).toBeVisible();
    await field('To').fill('maud@mill.example');
    await page.getByRole('button', { name: 'Send a test letter' }).click();
    await expect(page.getByText(/does not take this user and password .*Type both again/)).toBeVisible();
    await page.getByLabel('The password').selectOption({ label: 'is typed here' });
    await page.getByLabel('Password', { exact: true }).fill('a mail password');
    await page.getByRole('button', { name: 'Save the mail settings' }).click();
    await expect(page.getByText('Saved. Letters that waited are tried at once.')).toBeVisible();
    await page.getByRole('button', { name: 'Send a test letter' }).click();
    await expect(page.getByText('The letter went out to maud@mill.example.')).toBeVisible();
    expect(mail.arrived).toMatchObject([{ to: 'maud@mill.example', user: 'shedbeat' }]);
  });

  await test.step('a new foreman is added and invited', async () => {
    await page.goto('/set-up/people');
    await page.getByRole('link', { name: 'Add a person' }).click();
    await field('Name').fill('Nell Hoyle');
    await field('Short name').fill('Nell');
    await field('Works number').fill(PEOPLE.weaver.worksNumber);
    await expect(page.getByText(`${PEOPLE.weaver.name} has this works number.`)).toBeVisible();
    await field('Works number').fill('31');
    await field('E-mail').fill('nell@mill.example');
    await page.getByRole('checkbox', { name: /^Weaver/ }).uncheck();
    await page.getByRole('checkbox', { name: /^Foreman/ }).check();
    await expectAccessible(page, 'a new person');
    await page.getByRole('button', { name: 'Add the person' }).click();
    await expect(page.getByText('Nell Hoyle is saved.')).toBeVisible();
    await expectAccessible(page, 'people');
    await page.getByRole('link', { name: 'Send an invitation or print a PIN' }).click();
    await page.getByRole('button', { name: 'Send the invitation' }).click();
    await expect(page.getByText('The letter went out to nell@mill.example.')).toBeVisible();
    await expectAccessible(page, 'a person');
  });

  const nell = await openScreen(browser, mill, { width: 360, height: 740 });
  await test.step('she opens the link on her phone, chooses a password and is in', async () => {
    const link = linkIn(mail.arrived.at(-1)?.text ?? '');
    await nell.page.goto(link);
    await expect(nell.page.getByText('Nell Hoyle, choose the password')).toBeVisible();
    await expectAccessible(nell.page, 'welcome');
    await nell.page.getByLabel('Password').fill('short');
    await expect(nell.page.getByText('5 more characters: at least 10.')).toBeVisible();
    await nell.page.getByLabel('Password').fill(CHOSEN);
    await nell.page.getByRole('button', { name: 'Keep it and sign in' }).click();
    await expect(nell.page.getByRole('button', { name: 'Signed in: Nell Hoyle' })).toBeVisible();
    await nell.page.goto('/sign-in');
    await nell.page.goto(link);
    await expect(nell.page.getByText('This link was used already, and works once.')).toBeVisible();
  });

  await test.step('later she has forgotten it', async () => {
    await nell.page.goto('/forgotten');
    await expectAccessible(nell.page, 'forgotten password');
    await nell.page.getByRole('textbox', { name: 'E-mail' }).fill('nell@mill.example');
    await nell.page.getByRole('button', { name: 'Send the letter' }).click();
    await expect(nell.page.getByText('If somebody here has the address')).toBeVisible();
    await expect.poll(() => mail.arrived.length).toBe(3);
    await nell.page.goto(linkIn(mail.arrived.at(-1)?.text ?? ''));
    await expect(nell.page.getByRole('heading', { name: 'A new password' })).toBeVisible();
  });
  await nell.context.close();
  await mail.close();
});

test('a tablet is registered by a code, a weaver signs in on it with a PIN from a slip @set-up', async ({
  browser,
  mill,
  desk: { page },
}) => {
  test.setTimeout(120_000);
  await new DeskSignIn(page).signIn('manager');

  let code = '';
  await test.step('the manager makes a code', async () => {
    await page.goto('/set-up/tablets');
    await expect(page.getByRole('heading', { name: 'Register a tablet' })).toBeVisible();
    await expectAccessible(page, 'tablets');
    await page.getByRole('textbox', { name: 'Name of the tablet' }).fill('Alley A');
    await expect(page.getByText('There is one called Alley A already.')).toBeVisible();
    await page.getByRole('textbox', { name: 'Name of the tablet' }).fill('By the door');
    await page.getByRole('button', { name: 'Make a code for it' }).click();
    await expect(page.getByText('It works once, for 15 min more.')).toBeVisible();
    await expect(page.getByRole('img', { name: 'Square code with the address and the code' })).toBeVisible();
    await expectAccessible(page, 'a tablet’s code');
    code = (await page.locator('app-tablet-code-card .code').textContent())?.trim() ?? '';
  });

  const tablet = await openScreen(browser, mill, { width: 1024, height: 768 });
  await test.step('the tablet takes it, once', async () => {
    await tablet.page.goto('/tablet/code');
    await expectAccessible(tablet.page, 'a code to type');
    await tablet.page.getByRole('textbox', { name: 'Code' }).fill('AAAA');
    await tablet.page.getByRole('button', { name: 'Make it a tablet' }).click();
    await expect(tablet.page.getByText('A code has 8 letters and digits; this has 4.')).toBeVisible();
    await tablet.page.getByRole('textbox', { name: 'Code' }).fill('AAAA-BBBB');
    await tablet.page.getByRole('button', { name: 'Make it a tablet' }).click();
    await expect(tablet.page.getByText('This code is not right.')).toBeVisible();
    await tablet.page.getByRole('textbox', { name: 'Code' }).fill(code.toLowerCase());
    await tablet.page.getByRole('button', { name: 'Make it a tablet' }).click();
    await expect(tablet.page.getByRole('heading', { name: 'By the door' })).toBeVisible();
    const other = await openScreen(browser, mill, { width: 1024, height: 768 });
    await other.page.goto(`/tablet/code#${code}`);
    await other.page.getByRole('button', { name: 'Make it a tablet' }).click();
    await expect(other.page.getByText('This code has made a tablet already')).toBeVisible();
    await other.context.close();
  });

  let pin = '';
  await test.step('the manager prints a slip, black on white', async () => {
    // The page sees by itself that the code was taken.
    await expect(page.locator('app-tablet-code-card')).toBeHidden();
    await expect(page.getByRole('heading', { name: 'By the door' })).toBeVisible();
    await page.getByRole('button', { name: 'Rename By the door' }).click();
    await page.getByRole('textbox', { name: 'Name of the tablet' }).last().fill('North door');
    await page.getByRole('button', { name: 'Keep the name' }).click();
    await expect(page.getByRole('heading', { name: 'North door' })).toBeVisible();
    await page.goto('/set-up/people');
    await page.getByRole('checkbox', { name: `Choose ${PEOPLE.weaver.name}` }).check();
    await page.getByRole('button', { name: 'PIN slips for 1' }).click();
    await expect(page.getByText('the old PIN ends')).toBeVisible();
    await page.getByRole('button', { name: 'Make the new PINs' }).click();
    const slip = page.getByRole('listitem').filter({ hasText: 'For you alone' });
    await expect(slip).toContainText(PEOPLE.weaver.name);
    await expectAccessible(page, 'PIN slips');
    pin = (await slip.locator('dd').nth(1).textContent())?.trim() ?? '';
    await page.emulateMedia({ media: 'print', colorScheme: 'dark' });
    const colours = await slip.evaluate((element) => {
      const list = getComputedStyle(element.parentElement ?? element);
      return [list.color, list.backgroundColor];
    });
    expect(colours).toEqual(['rgb(0, 0, 0)', 'rgb(255, 255, 255)']);
    await expect(page.getByRole('button', { name: 'Print' })).toBeHidden();
    await page.emulateMedia({ media: 'screen' });
    // Left before printing, the new PINs would be lost: it is asked.
    await page.getByRole('link', { name: 'To the people' }).click();
    await expect(page.getByRole('heading', { name: 'Leave without saving?' })).toBeVisible();
    await page.getByRole('button', { name: 'Stay here' }).click();
  });

  await test.step('and the weaver signs in by it', async () => {
    const door = new FloorSignIn(tablet.page);
    await door.signIn(PEOPLE.weaver.worksNumber, pin);
    await expect(tablet.page.getByRole('button', { name: `Signed in: ${PEOPLE.weaver.name}` })).toBeVisible();
    expect(SHED.name).toBe('Long shed');
  });
  await tablet.context.close();
});

test('people and their usual looms by keyboard alone, with 500 in the list, and on a phone @set-up', async ({
  mill,
  desk: { page },
}) => {
  test.setTimeout(120_000);
  const many = Array.from(
    { length: 500 },
    (_, index) => `('p${index}', 'Person ${index}', 'P ${index}', '${5_000 + index}', '[]')`,
  );
  await mill.change(
    `INSERT INTO "person" ("id", "name", "shortName", "worksNumber", "usualSet") VALUES ${many.join(', ')}`,
  );
  await mill.change(
    `INSERT INTO "person_rights" SELECT "id", 1, '["weaver"]', '[]', 0 FROM "person" WHERE "id" LIKE 'p%' AND "worksNumber" >= '5000'`,
  );
  await new DeskSignIn(page).signIn('manager');
  await page.goto('/set-up/people');
  await expect(page.getByText('505 people')).toBeVisible();
  await page.getByPlaceholder('Show only …').fill('5499');
  await expect(page.getByText('1 of 505 people')).toBeVisible();
  await page.getByRole('button', { name: 'Person 499' }).focus();
  await page.keyboard.press('Enter');
  await expect(page.getByRole('heading', { name: 'Person 499' })).toBeVisible();

  for (const number of [1, 2, 3])
    await page
      .getByRole('combobox', { name: 'Add a loom at the end' })
      .selectOption({ label: `Loom ${number}` });
  await page.getByRole('button', { name: 'Loom 3, earlier' }).focus();
  await page.keyboard.press('Enter');
  await page.keyboard.press('Enter');
  await expect(page.getByRole('list', { name: 'Looms in walking order' }).getByRole('listitem')).toHaveText([
    /Loom 3/,
    /Loom 1/,
    /Loom 2/,
  ]);
  await page.getByRole('link', { name: 'Leave it' }).click();
  await expect(page.getByRole('heading', { name: 'Leave without saving?' })).toBeVisible();
  await page.getByRole('button', { name: 'Stay here' }).click();
  await page.getByRole('button', { name: 'Save the person' }).click();
  await expect(page.getByText('Person 499 is saved.')).toBeVisible();

  await page.setViewportSize({ width: 360, height: 740 });
  for (const path of ['/set-up/people', '/set-up/people/wanda', '/set-up/tablets', '/set-up/mail']) {
    await page.goto(path);
    await expect(page.locator('main h1').first()).toBeVisible();
    await expectAccessible(page, `${path} on a phone`);
    expect(await page.evaluate(() => document.documentElement.scrollWidth), path).toBeLessThanOrEqual(360);
  }
});
