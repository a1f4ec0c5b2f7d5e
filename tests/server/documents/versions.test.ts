import { describe, expect, test } from "vitest";
import { Machine } from "#shared/formats/machine.ts";
import { Polymer } from "#shared/formats/polymer.ts";
import { Profile } from "#shared/formats/profile.ts";
import { sampleMachine, samplePolymer, sampleProfile } from "#tests/helpers/sample.ts";
import { testServer } from "#tests/helpers/server.ts";

const server = testServer();

const KINDS = [
  { resource: "machines", sample: sampleMachine, format: Machine },
  { resource: "polymers", sample: samplePolymer, format: Polymer },
  { resource: "profiles", sample: sampleProfile, format: Profile },
];

describe.each(KINDS)("$resource", ({ resource, sample, format }) => {
  const url = `/api/${resource}`;
  const create = async (changes: object = {}, note?: string) => {
    const { body } = await server
      .as("engineer")
      .post(url)
      .send({ document: sample(changes), note })
      .expect(201);
    return body;
  };

  test("the first version is stored and comes back as it was given", async () => {
    const made = await create({}, "as measured");
    expect(made).toMatchObject({ number: 1, note: "as measured", createdBy: "engineer@alder.example" });
    const { body } = await server.as("viewer").get(`${url}/${made.id}/versions/1`).expect(200);
    expect(body.document).toEqual(format.parse(sample()));
    expect(body).toEqual(made);
  });

  test("a version on top of the latest is added, and the one before stays as it was", async () => {
    const { id } = await create();
    const second = { basedOn: 1, document: sample({ name: "Renamed" }), note: "renamed" };
    await server.as("engineer").post(`${url}/${id}/versions`).send(second).expect(201);
    const history = await server.as("viewer").get(`${url}/${id}`).expect(200);
    expect(history.body.name).toBe("Renamed");
    expect(history.body.versions.map(({ number }: { number: number }) => number)).toEqual([2, 1]);
    const first = await server.as("viewer").get(`${url}/${id}/versions/1`).expect(200);
    expect(first.body.document.name).toBe(sample().name);
  });

  test("a version based on one that is no longer the latest is a conflict, and nothing is stored", async () => {
    const { id } = await create();
    const draft = (name: string) => ({ basedOn: 1, document: sample({ name }) });
    await server.as("engineer").post(`${url}/${id}/versions`).send(draft("Mine")).expect(201);
    const { body } = await server.as("lead").post(`${url}/${id}/versions`).send(draft("Yours")).expect(409);
    expect(body.code).toBe("version-conflict");
    expect(body.detail).toContain("version 2 has been written since by engineer@alder.example");
    const history = await server.as("viewer").get(`${url}/${id}`).expect(200);
    expect(history.body).toMatchObject({ name: "Mine", versions: { length: 2 } });
  });

  test("of two versions written at the same moment one is stored and the other is a conflict", async () => {
    const { id } = await create();
    const write = (name: string) =>
      server
        .as("engineer")
        .post(`${url}/${id}/versions`)
        .send({ basedOn: 1, document: sample({ name }) });
    const replies = await Promise.all([write("One"), write("Other")]);
    expect(replies.map(({ status }) => status).sort()).toEqual([201, 409]);
  });

  test("a second document of the same name is refused, also by renaming", async () => {
    const { id } = await create();
    const again = await server.as("engineer").post(url).send({ document: sample() }).expect(409);
    expect(again.body.code).toBe("name-taken");
    await create({ name: "Another" });
    const rename = { basedOn: 1, document: sample({ name: "Another" }) };
    const renamed = await server.as("engineer").post(`${url}/${id}/versions`).send(rename).expect(409);
    expect(renamed.body.code).toBe("name-taken");
  });

  test("the list has one line for each document, by name, with its latest version", async () => {
    const { id } = await create({ name: "Beta" });
    await create({ name: "Alpha" });
    const second = { basedOn: 1, document: sample({ name: "Beta" }), note: "two" };
    await server.as("engineer").post(`${url}/${id}/versions`).send(second).expect(201);
    const { body } = await server.as("viewer").get(url).expect(200);
    expect(body).toMatchObject([
      { name: "Alpha", versions: 1, latest: { number: 1 } },
      { id, name: "Beta", versions: 2, latest: { number: 2, note: "two" } },
    ]);
  });

  test("a document that does not keep to its format is refused with every place that is wrong", async () => {
    const document = sample({ format: "something/1", name: "" });
    const { body } = await server.as("engineer").post(url).send({ document }).expect(422);
    expect(body.code).toBe("invalid-request");
    expect(body.errors.map(({ path }: { path: string }) => path)).toEqual(
      expect.arrayContaining(["body.document.format", "body.document.name"]),
    );
  });

  test("a stranger may not see or continue another team's documents", async () => {
    const { id } = await create();
    const stranger = server.as("lead", "birch");
    expect((await stranger.get(url).expect(200)).body).toEqual([]);
    for (const path of [`${url}/${id}`, `${url}/${id}/versions/1`]) {
      expect((await stranger.get(path).expect(404)).body.code).toBe("not-found");
    }
    await stranger.post(`${url}/${id}/versions`).send({ basedOn: 1, document: sample() }).expect(404);
    await stranger.post(url).send({ document: sample() }).expect(201);
  });

  test.each(["no-uuid", "00000000-0000-4000-8000-000000000000"])("%s is the id of nothing", async (id) => {
    await server.as("viewer").get(`${url}/${id}`).expect(404);
  });

  test.each(["0", "-1", "1.5", "2", "1e3", "99999999999"])("there is no version %s", async (number) => {
    const { id } = await create();
    await server.as("viewer").get(`${url}/${id}/versions/${number}`).expect(404);
  });
});

test.each([
  ["machines", sampleMachine, Machine],
  ["profiles", sampleProfile, Profile],
])(
  "a version that a document of %s brings along is ignored: the team numbers its own",
  async (resource, sample, format) => {
    const url = `/api/${resource}`;
    const first = { document: sample({ version: 7 }) };
    const { body: made } = await server.as("engineer").post(url).send(first).expect(201);
    expect([made.number, made.document]).toEqual([1, format.parse(sample())]);
    const next = { basedOn: 1, document: sample({ version: 7, name: "Renamed" }) };
    const { body } = await server.as("engineer").post(`${url}/${made.id}/versions`).send(next).expect(201);
    expect([body.number, body.document]).toEqual([2, format.parse(sample({ name: "Renamed" }))]);
  },
);

describe("a list", () => {
  test("says of each document what its latest version holds", async () => {
    const machine = await server
      .as("engineer")
      .post("/api/machines")
      .send({ document: sampleMachine({ name: "Gist" }) });
    const profile = await server
      .as("engineer")
      .post("/api/profiles")
      .send({ document: sampleProfile({ name: "Gist" }) });
    const polymer = await server
      .as("engineer")
      .post("/api/polymers")
      .send({ document: samplePolymer({ name: "Gist" }) });
    const listed = async (resource: string, { id }: { id: string }) => {
      const { body } = await server.as("viewer").get(`/api/${resource}`).expect(200);
      return body.find((entry: { id: string }) => entry.id === id);
    };
    const { channels } = machine.body.document;
    expect((await listed("machines", machine.body)).machine.channels).toEqual(
      channels.map(({ id, kind }: { id: string; kind: string }) => ({ id, kind })),
    );
    const { zones } = profile.body.document;
    const gist = (await listed("profiles", profile.body)).profile;
    expect(gist.polymer).toBe(profile.body.document.polymer);
    expect(gist.zones.map(({ name }: { name: string }) => name)).toEqual(
      zones.map(({ name }: { name: string }) => name),
    );
    expect((await listed("polymers", polymer.body)).polymer.tgC).toBe(polymer.body.document.tgC.value);

    const wanted = { ...profile.body.document, polymer: "Another" };
    await server
      .as("engineer")
      .post(`/api/profiles/${profile.body.id}/versions`)
      .send({ basedOn: 1, document: wanted })
      .expect(201);
    expect((await listed("profiles", profile.body)).profile.polymer).toBe("Another");
  });
});
