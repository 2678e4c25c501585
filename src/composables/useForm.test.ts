import { describe, expect, it } from 'vitest';
import { nextTick } from 'vue';
import { browserDraft, dropDrafts } from './browserDraft';
import { useForm, type Violations } from './useForm';

interface Values {
  name: string;
  age: string;
}
const first = (): Values => ({ name: '', age: '' });
const check = ({ name }: Values): Violations => (name.trim() === '' ? { name: { code: 'required' } } : {});
const isValues = (values: object): values is Values => 'name' in values;
const later = async () => {
  await nextTick();
  await Promise.resolve();
};

describe('useForm', () => {
  it('says nothing before a field was touched, and says it from then on', () => {
    const form = useForm({ first, check });
    expect(form.shown('name')).toBeNull();
    form.touch('name');
    expect(form.shown('name')).toEqual({ code: 'required' });
    form.values.name = 'Ilse';
    expect(form.shown('name')).toBeNull();
  });

  it('does not send what is wrong, and then shows everything', async () => {
    const form = useForm({ first, check });
    let sent = 0;
    expect(await form.submit(() => Promise.resolve(sent++))).toBeNull();
    expect(sent).toBe(0);
    expect(form.failedFields.value).toEqual(['name']);
  });

  it('sends once at a time', async () => {
    const form = useForm({ first, check });
    form.values.name = 'Ilse';
    let sent = 0;
    const send = () => Promise.resolve(++sent);
    expect(await Promise.all([form.submit(send), form.submit(send)])).toEqual([1, null]);
  });

  it('keeps what was typed when the server says no, and shows that no at its field until it is changed', async () => {
    const form = useForm({ first, check });
    form.values.name = 'taken';
    const no = new Error('taken');
    expect(await form.submit(() => Promise.reject(no))).toBeNull();
    expect(form.refused.value).toBe(no);
    expect(form.values.name).toBe('taken');
    form.refuse('name', { code: 'taken' });
    form.values.age = '4';
    await later();
    expect(form.shown('name')).toEqual({ code: 'taken' });
    form.values.name = 'free';
    await later();
    expect(form.shown('name')).toBeNull();
  });

  it('keeps a draft until it is sent', async () => {
    const draft = browserDraft('test', isValues);
    useForm({ first, check, draft }).values.name = 'half';
    await later();
    const again = useForm({ first, check, draft });
    expect(again.values.name).toBe('half');
    expect(again.fromDraft.value).toBe(true);
    await again.submit(() => Promise.resolve(1));
    expect(useForm({ first, check, draft }).fromDraft.value).toBe(false);
  });

  it('begins anew without a draft when it is reset', async () => {
    const draft = browserDraft('reset', isValues);
    const form = useForm({ first, check, draft });
    form.values.name = 'half';
    await later();
    form.reset();
    await later();
    await later();
    expect(form.values.name).toBe('');
    expect(draft.read()).toBeNull();
  });
});

describe('browserDraft', () => {
  it('turns away what is no draft of this form', () => {
    window.localStorage.setItem('boltwalk-draft:old', '{"values":{"other":1}}');
    window.localStorage.setItem('boltwalk-draft:cut', '{"val');
    expect(browserDraft('old', isValues).read()).toBeNull();
    expect(browserDraft('cut', isValues).read()).toBeNull();
  });

  it('drops drafts and leaves all else alone', () => {
    window.localStorage.setItem('boltwalk-looks', 'x');
    browserDraft('mine', isValues).keep({ name: 'a', age: '' });
    dropDrafts();
    expect(browserDraft('mine', isValues).read()).toBeNull();
    expect(window.localStorage.getItem('boltwalk-looks')).toBe('x');
  });
});
