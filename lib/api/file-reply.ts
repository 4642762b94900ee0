import { contentDisposition } from "@/lib/files/content-disposition";

/** A download instead of JSON, in one of these media types. */
export type FileReply = { readonly fileTypes: readonly string[] };
export type FileResult = { readonly name: string; readonly type: string; readonly content: string | Uint8Array<ArrayBuffer> };

export const fileReply = (...fileTypes: readonly string[]): FileReply => ({ fileTypes });

export const isFileReply = (reply: object | null): reply is FileReply => reply !== null && "fileTypes" in reply;

/** Only a type that the route declares, so that its description stays true. */
export function sendFile(declared: FileReply, { name, type, content }: FileResult): Response {
  if (!declared.fileTypes.includes(type)) throw new Error(`The route declares no file of type ${type}.`);
  return new Response(content, { headers: { "content-type": type, "content-disposition": contentDisposition(name) } });
}
