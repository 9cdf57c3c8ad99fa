import { ProjectList } from './_components/project-list';

export default function OfficePage() {
  return (
    <>
      <h1 className="pt-6 pb-2 text-2xl font-bold">Projects</h1>
      <ProjectList />
    </>
  );
}
