/// <reference types="astro/client" />

declare namespace App {
  interface Locals {
    readonly requestId: string;
    readonly actor: import('@/domain/access/permission').Actor | null;
    readonly ports: import('@/services/ports').Ports;
    /** Set by a public page: the tag under which it is kept once it is rendered. */
    keepAs?: string;
  }
}
