export { IDBFactory, IDBKeyRange, IDBDatabase as FDBDatabase, IDBObjectStore as FDBObjectStore } from 'fake-indexeddb';
